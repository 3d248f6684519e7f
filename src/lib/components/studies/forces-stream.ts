import type { Equilibrium, ForcePoint, Warning, WholeAnalysis } from '../../engine/contract.ts';
import type { ErrorAnswer } from '../../schemas/force-answer.ts';
import type { ForceRequestInput } from '../../schemas/force.ts';

/** Asks the installation for forces and hands points on as they come in (lines of JSON: start, points, end or error). */

const ADDRESS = '/api/v1/forces';

export interface StreamStart {
	inputChecksum: string;
	engine: string;
	separationsNm: number[];
}

export interface StreamEnd extends WholeAnalysis {
	/** ISO, in UTC; by the clock of the reader. */
	receivedAt: string;
	equilibria: Equilibrium[];
	warnings: Warning[];
}

type Line =
	| ({ type: 'start' } & StreamStart)
	| { type: 'points'; indices: number[]; points: ForcePoint[] }
	| ({ type: 'end' } & Omit<StreamEnd, 'receivedAt'>)
	| ({ type: 'error' } & ErrorAnswer);

/** The request was understood and refused, or computing failed; `issues` name the fields. */
export class ForcesRefused extends Error {
	constructor(
		readonly code: string,
		message: string,
		readonly issues: readonly { path: string; message: string }[] = [],
		/** Seconds after which another attempt is welcome. */
		readonly retryAfter?: number
	) {
		super(message);
		this.name = 'ForcesRefused';
	}
}

export interface StreamListener {
	start(start: StreamStart): void;
	points(indices: readonly number[], points: readonly ForcePoint[]): void;
}

/** Whole lines of a body that arrives in pieces of any size. */
export async function* linesOf(body: AsyncIterable<Uint8Array>): AsyncGenerator<string> {
	const decoder = new TextDecoder();
	let rest = '';
	for await (const bytes of body) {
		rest += decoder.decode(bytes, { stream: true });
		const lines = rest.split('\n');
		rest = lines.pop() ?? '';
		yield* lines.filter((line) => line.trim() !== '');
	}
	rest += decoder.decode();
	if (rest.trim() !== '') yield rest;
}

/** Streams are not iterable in every browser yet. */
async function* chunksOf(stream: ReadableStream<Uint8Array>): AsyncGenerator<Uint8Array> {
	const reader = stream.getReader();
	try {
		for (let step = await reader.read(); !step.done; step = await reader.read()) yield step.value;
	} finally {
		reader.releaseLock();
	}
}

async function refusal(response: Response): Promise<ForcesRefused> {
	const retryAfter = Number(response.headers.get('retry-after')) || undefined;
	try {
		const { error } = (await response.json()) as ErrorAnswer;
		return new ForcesRefused(error.code, error.message, error.issues, retryAfter);
	} catch {
		return new ForcesRefused(
			'unreadable',
			`The server answered ${response.status} without saying why.`,
			[],
			retryAfter
		);
	}
}

/**
 * @throws ForcesRefused where the server says no; whatever `fetch` throws where it cannot be reached or `signal` aborts
 */
export async function computeForces(
	request: ForceRequestInput,
	listener: StreamListener,
	{ signal, fetch: send = fetch }: { signal: AbortSignal; fetch?: typeof fetch }
): Promise<StreamEnd> {
	const response = await send(ADDRESS, {
		method: 'POST',
		headers: { 'content-type': 'application/json', accept: 'application/x-ndjson' },
		body: JSON.stringify(request),
		signal
	});
	if (!response.ok || !response.body) throw await refusal(response);

	// Read to the very end: a body left unread counts as broken off, here and on the server.
	let end: StreamEnd | undefined;
	for await (const text of linesOf(chunksOf(response.body))) {
		const line = JSON.parse(text) as Line;
		if (line.type === 'start') listener.start(line);
		else if (line.type === 'points') listener.points(line.indices, line.points);
		else if (line.type === 'end') end = { ...line, receivedAt: new Date().toISOString() };
		else throw new ForcesRefused(line.error.code, line.error.message, line.error.issues);
	}
	if (end) return end;
	throw new ForcesRefused('cut-off', 'The answer broke off before its end; what came so far is shown.');
}
