import type { ForceResult } from '../compute/forces.ts';
import type { Progress } from '../compute/pool.ts';
import { problemOf } from './problem.ts';

/** A curve line by line while it is computed: start, points (coarse to fine, by index), end or error. */

export const LINES_TYPE = 'application/x-ndjson';

/** Whether the caller asks for lines; anything else gets one JSON object. */
export function wantsLines(request: Request): boolean {
	const accepted = (request.headers.get('accept') ?? '').split(',');
	return accepted.some((entry) => entry.split(';')[0].trim().toLowerCase() === LINES_TYPE);
}

/** What is known before the first point. */
export type Head = Pick<ForceResult, 'engine' | 'runtime' | 'inputChecksum' | 'versions'>;

export type Run = (progress: Progress, signal: AbortSignal) => Promise<ForceResult>;

/**
 * Answers as soon as the engine has accepted the work, so that a refusal is still an ordinary answer with its status.
 * What goes wrong after that is told by a last line of the type `error`.
 *
 * @param gone stops the work; so does the reader by closing the stream
 * @throws whatever `run` throws before it has started
 */
export async function streamLines(head: Head, run: Run, gone: AbortSignal): Promise<Response> {
	const closed = new AbortController();
	const encoder = new TextEncoder();
	let write = (_line: object) => {};
	let finish = () => {};
	const body = new ReadableStream<Uint8Array>({
		start(controller) {
			write = (line) => controller.enqueue(encoder.encode(`${JSON.stringify(line)}\n`));
			finish = () => controller.close();
		},
		cancel: () => closed.abort()
	});

	const signal = AbortSignal.any([gone, closed.signal]);
	/** A reader that has gone has closed the stream already, and writing to it would throw. */
	const tell = (line: object) => {
		if (!signal.aborted) write(line);
	};
	const { engine, runtime, inputChecksum, versions } = head;
	let result = Promise.resolve() as Promise<unknown>;
	await new Promise<void>((accepted, refused) => {
		let started = false;
		result = run(
			{
				onStart: ({ separationsNm }) => {
					tell({ type: 'start', engine, runtime, inputChecksum, versions, separationsNm });
					started = true;
					accepted();
				},
				onPoints: ({ indices, points }) => tell({ type: 'points', from: indices[0], indices, points })
			},
			signal
		).then(
			({ equilibria, warnings, nonRetarded }) =>
				tell({ type: 'end', equilibria, warnings, ...(nonRetarded ? { nonRetarded } : {}) }),
			(error: unknown) => {
				if (!started) refused(error);
				else if (!signal.aborted) tell({ type: 'error', error: problemOf(error).error });
			}
		);
	});
	void result.finally(() => {
		if (!signal.aborted) finish();
	});
	return new Response(body, {
		headers: {
			'content-type': LINES_TYPE,
			'cache-control': 'no-store',
			// A proxy that collects the answer would undo the point of sending it in pieces.
			'x-accel-buffering': 'no'
		}
	});
}
