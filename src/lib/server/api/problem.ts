import { randomUUID } from 'node:crypto';
import {
	Conflict,
	Forbidden,
	InvalidInput,
	NotFound,
	StateError,
	TooManyRequests,
	type Issue
} from '../errors.ts';
import { BadRequest, Cancelled, Unavailable } from '../limits/refusals.ts';
import { log } from '../log.ts';

/** The one place where an error becomes an answer of the API. */

export interface Problem {
	status: number;
	error: { code: string; message: string; issues?: Issue[]; id?: string };
	headers?: Record<string, string>;
}

/** What is told about an error that a service throws on purpose; undefined for everything unforeseen. */
export function knownProblem(error: unknown): Problem | undefined {
	if (error instanceof InvalidInput) {
		return { status: 422, error: { code: error.code, message: error.message, issues: error.issues } };
	}
	if (error instanceof BadRequest) {
		return { status: error.status, error: { code: error.code, message: error.message } };
	}
	if (error instanceof NotFound) return plain(404, 'not-found', error);
	if (error instanceof Forbidden) return plain(403, 'forbidden', error);
	if (error instanceof Conflict) return plain(409, 'conflict', error);
	if (error instanceof StateError) return plain(409, 'state', error);
	if (error instanceof TooManyRequests) {
		return { ...plain(429, 'too-many-requests', error), headers: retryAfter(error.retryAfterSeconds) };
	}
	if (error instanceof Unavailable) {
		return { ...plain(503, error.code, error), headers: retryAfter(error.retryAfterSeconds) };
	}
	// Nobody reads this answer; the number is what the request log shows.
	if (error instanceof Cancelled) return plain(499, 'cancelled', error);
	return undefined;
}

function plain(status: number, code: string, { message }: Error): Problem {
	return { status, error: { code, message } };
}

function retryAfter(seconds: number | undefined): Record<string, string> {
	return seconds === undefined ? {} : { 'retry-after': String(Math.max(1, Math.ceil(seconds))) };
}

/** As `knownProblem`; what nobody foresaw is logged once, and the caller sees its id and nothing else. */
export function problemOf(error: unknown): Problem {
	const known = knownProblem(error);
	if (known) return known;
	const id = logUnforeseen(error);
	return {
		status: 500,
		error: { code: 'internal', message: `Something went wrong here. It is logged as ${id}.`, id }
	};
}

/** Writes an unforeseen error into the log. @returns the id to show to the person. */
export function logUnforeseen(error: unknown, context: Record<string, unknown> = {}): string {
	const id = randomUUID();
	log().error({ id, ...context, error: describe(error) }, 'unforeseen error');
	return id;
}

/** A failed query carries its parameters in the message, which may be people's data: only its cause is written down. */
function describe(error: unknown): Record<string, unknown> {
	if (!(error instanceof Error)) return { message: String(error) };
	const { cause } = error;
	if (error.name === 'DrizzleQueryError' || error.message.startsWith('Failed query')) {
		const { code, constraint_name: constraint, table_name: table } = (cause ?? {}) as Record<string, unknown>;
		return { name: 'failed query', code, constraint, table, stack: framesOf(error) };
	}
	return {
		name: error.name,
		message: error.message,
		stack: framesOf(error),
		...(cause ? { cause: describe(cause) } : {})
	};
}

function framesOf(error: Error): string[] {
	return (error.stack ?? '')
		.split('\n')
		.filter((line) => line.trimStart().startsWith('at '))
		.slice(0, 12)
		.map((line) => line.trim());
}

export function problemResponse(error: unknown): Response {
	const problem = problemOf(error);
	return Response.json(
		{ error: problem.error },
		{ status: problem.status, headers: { 'cache-control': 'no-store', ...problem.headers } }
	);
}

/** Wraps the work of a route of the API. */
export async function answering(work: () => Response | Promise<Response>): Promise<Response> {
	try {
		return await work();
	} catch (error) {
		return problemResponse(error);
	}
}
