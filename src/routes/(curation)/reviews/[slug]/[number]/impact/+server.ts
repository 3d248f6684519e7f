import { answering } from '$lib/server/api/problem.ts';
import { LINES_TYPE } from '$lib/server/api/force-stream.ts';
import { personOf } from '$lib/server/auth/require.ts';
import { viewerOf } from '$lib/server/library/viewer.ts';
import * as versions from '$lib/server/library/versions.ts';
import { impactOf } from '$lib/server/studies/impact.ts';
import type { RequestHandler } from './$types';

/** Line by line as each study is computed; closing the page stops it. */
export const GET: RequestHandler = ({ params, locals, request }) =>
	answering(async () => {
		const actor = personOf(locals.principal);
		const { ref, model } = await versions.get(
			params.slug,
			params.number,
			undefined,
			viewerOf(locals.principal)
		);
		const closed = new AbortController();
		const lines = impactOf(actor, { ref, model }, AbortSignal.any([request.signal, closed.signal]));
		const encoder = new TextEncoder();
		const body = new ReadableStream<Uint8Array>({
			async pull(controller) {
				const { done, value } = await lines.next();
				if (done) controller.close();
				else controller.enqueue(encoder.encode(`${JSON.stringify(value)}\n`));
			},
			cancel: () => closed.abort()
		});
		return new Response(body, { headers: { 'content-type': LINES_TYPE, 'cache-control': 'no-store' } });
	});
