/** The only place where services ask for the time, so that a test can stand still. */

type Clock = () => Date;

const systemClock: Clock = () => new Date();
let clock = systemClock;

export function now(): Date {
	return clock();
}

/** For tests; without an argument the clock of the system is back. */
export function setClock(replacement: Clock = systemClock): void {
	clock = replacement;
}
