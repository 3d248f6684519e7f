import { config } from '../config.ts';
import { callerOf } from './caller.ts';
import { charge } from './rate.ts';

/** Reading, checking and answering cost something too, whatever the engine does. */
const LEAST_SECONDS = 0.01;
const WINDOW_SECONDS = 60;

/**
 * Takes the estimated seconds of a computation from what its caller may use in a minute.
 *
 * @throws TooManyRequests when the minute's share is used up
 */
export async function chargeComputing(address: string, seconds: number): Promise<void> {
	const limit = {
		name: 'compute',
		amount: config().computeSecondsPerMinute,
		windowSeconds: WINDOW_SECONDS,
		what: 'computing time'
	};
	await charge(limit, callerOf(address), Math.max(LEAST_SECONDS, seconds));
}
