import { TooManyRequests } from '../errors.ts';
import { callerOf } from '../limits/caller.ts';
import { charge } from '../limits/rate.ts';

const HOUR = 3600;
const PER_ADDRESS = { name: 'link-address', amount: 5, windowSeconds: HOUR, what: 'sign-in links' };
const PER_CLIENT = { name: 'link-client', amount: 20, windowSeconds: HOUR, what: 'sign-in links' };
const WRONG = { name: 'sign-in-wrong', amount: 10, windowSeconds: 15 * 60, what: 'attempts' };

async function counted(limit: typeof PER_CLIENT, caller: string, sentence: string): Promise<void> {
	try {
		await charge(limit, caller, 1);
	} catch (error) {
		if (!(error instanceof TooManyRequests)) throw error;
		throw new TooManyRequests(sentence, error.retryAfterSeconds);
	}
}

/** @throws TooManyRequests after 20 links in an hour from one client, whatever the addresses */
export async function chargeClient(client: string): Promise<void> {
	await counted(
		PER_CLIENT,
		callerOf(client),
		'Too many sign-in links were asked for from here. Wait, then ask again.'
	);
}

/**
 * Whether one more mail may go to the address: five in an hour. Told to nobody, because the answer must be the same for
 * every address.
 */
export async function mayMail(email: string): Promise<boolean> {
	try {
		await charge(PER_ADDRESS, email, 1);
		return true;
	} catch (error) {
		if (error instanceof TooManyRequests) return false;
		throw error;
	}
}

/** Counts a link or an invitation that could not be used. @throws TooManyRequests after 10 in a quarter of an hour */
export async function chargeWrong(client: string): Promise<void> {
	await counted(
		WRONG,
		callerOf(client),
		'Too many links that cannot be used were tried from here. Wait, then try again.'
	);
}
