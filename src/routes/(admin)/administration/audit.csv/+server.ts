import { auditCsvHead, auditCsvLine } from '$lib/server/audit/csv.ts';
import { auditFilter, list } from '$lib/server/audit/list.ts';
import { parseInput } from '$lib/server/api/issues.ts';
import { answering } from '$lib/server/api/problem.ts';
import type { RequestHandler } from './$types';

const AT_ONCE = 1000;

/** Streams page by page, so that a long trail needs no memory. */
export const GET: RequestHandler = ({ url }) =>
	answering(() => {
		const filter = parseInput(auditFilter, Object.fromEntries(url.searchParams));
		let cursor: string | null | undefined;
		const encoder = new TextEncoder();
		const body = new ReadableStream<Uint8Array>({
			start: (controller) => controller.enqueue(encoder.encode(auditCsvHead)),
			pull: async (controller) => {
				if (cursor === null) return controller.close();
				const { entries, next } = await list(filter, cursor, AT_ONCE);
				cursor = next;
				controller.enqueue(encoder.encode(entries.map(auditCsvLine).join('')));
			}
		});
		return new Response(body, {
			headers: {
				'content-type': 'text/csv; charset=utf-8',
				'content-disposition': 'attachment; filename="audit.csv"'
			}
		});
	});
