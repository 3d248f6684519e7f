import { log } from '../log.ts';
import type { Transport } from '../mail/transport.ts';
import { deliverOne } from './deliver.ts';

/** How often the table is looked at when nothing was heard of. */
const LOOK_EVERY_MS = 1000;

export interface DeliveryLoop {
	/** Waits for the mail under way and ends. */
	stop: () => Promise<void>;
}

/** Sends what is due, again and again, one at a time, until stopped. */
export function startDelivery(transport: Transport, everyMs = LOOK_EVERY_MS): DeliveryLoop {
	let stopped = false;
	let wake: () => void = () => undefined;
	const pause = () =>
		new Promise<void>((resolve) => {
			const timer = setTimeout(resolve, everyMs);
			wake = () => {
				clearTimeout(timer);
				resolve();
			};
		});

	const running = (async () => {
		while (!stopped) {
			try {
				while (!stopped && (await deliverOne(transport)) !== 'nothing-due');
			} catch (error) {
				// The database is away: the next look finds out whether it is back.
				log().warn({ error: error instanceof Error ? error.name : 'unknown' }, 'mail could not be looked at');
			}
			if (!stopped) await pause();
		}
	})();

	return {
		stop: async () => {
			stopped = true;
			wake();
			await running;
			transport.close();
		}
	};
}
