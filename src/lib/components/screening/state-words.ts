import type { ScreeningSummary } from '../../schemas/screening.ts';

/** Seconds as somebody waiting counts them. */
export function duration(seconds: number): string {
	if (seconds < 1) return 'less than a second';
	if (seconds < 90) return `${Math.round(seconds)} s`;
	if (seconds < 5400) return `${Math.round(seconds / 60)} min`;
	return `${(seconds / 3600).toFixed(1)} h`;
}

type Told = Pick<ScreeningSummary, 'state' | 'cells' | 'cellsDone' | 'secondsLeft' | 'failure'>;

/** What a screening is doing, in words. */
export function stateWords({ state, cells, cellsDone, secondsLeft, failure }: Told): string {
	const share = `${cellsDone.toLocaleString('en')} of ${cells.toLocaleString('en')} done`;
	switch (state) {
		case 'queued':
			return 'waits for a worker';
		case 'running':
			return secondsLeft === null ? share : `${share}, about ${duration(secondsLeft)} left`;
		case 'paused':
			return `paused, ${share}`;
		case 'finished':
			return 'finished';
		case 'cancelled':
			return `cancelled, ${share}`;
		case 'failed':
			return `failed: ${failure ?? 'no reason is known'}`;
	}
}
