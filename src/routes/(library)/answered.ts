import { error } from '@sveltejs/kit';
import {
	Conflict,
	Forbidden,
	InvalidInput,
	NotFound,
	StateError,
	TooManyRequests
} from '$lib/server/errors.ts';
import { Unavailable } from '$lib/server/limits/refusals.ts';

/** Calls a service and answers its refusals as pages; anything unforeseen goes on to the hook that logs it. */

const STATUS: readonly [new (...args: never[]) => Error, number][] = [
	[NotFound, 404],
	[Forbidden, 403],
	[Conflict, 409],
	[StateError, 409],
	[InvalidInput, 422],
	[TooManyRequests, 429],
	[Unavailable, 503]
];

export async function answered<T>(call: () => Promise<T>): Promise<T> {
	try {
		return await call();
	} catch (refusal) {
		const known = STATUS.find(([kind]) => refusal instanceof kind);
		if (known === undefined) throw refusal;
		error(known[1], (refusal as Error).message);
	}
}
