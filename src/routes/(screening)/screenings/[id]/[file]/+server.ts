import { error } from '@sveltejs/kit';
import { personOf } from '$lib/server/auth/require.ts';
import { csv, json } from '$lib/server/screening/exports.ts';
import { answered } from '../../../../(library)/answered.ts';
import { loadResults } from '../../../load-results.ts';
import type { RequestHandler } from './$types';

const FILES = {
	'result.csv': { type: 'text/csv; charset=utf-8', write: csv },
	'result.json': { type: 'application/json', write: json }
} as const;

export const GET: RequestHandler = ({ locals, params, url }) =>
	answered(async () => {
		if (!Object.hasOwn(FILES, params.file))
			error(404, `A screening has no file “${params.file}”. It has result.csv and result.json.`);
		const { type, write } = FILES[params.file as keyof typeof FILES];
		const { found, results, ranking } = await loadResults(personOf(locals.principal), params.id);
		const pieces = write(found, results, ranking, url.origin);
		const encoder = new TextEncoder();
		const body = new ReadableStream<Uint8Array>({
			pull(controller) {
				let text = '';
				while (text.length < 65_536) {
					const { value, done } = pieces.next();
					if (done) {
						if (text !== '') controller.enqueue(encoder.encode(text));
						return controller.close();
					}
					text += value;
				}
				controller.enqueue(encoder.encode(text));
			}
		});
		return new Response(body, {
			headers: {
				'content-type': type,
				'content-disposition': `attachment; filename="screening-${params.id.slice(0, 8)}-${params.file}"`,
				'cache-control': 'private, no-store'
			}
		});
	});
