import { log } from '../log.ts';

/** One line a request: what was asked and how it ended. No bodies, no queries, no addresses of people. */
export function logRequest(entry: {
	method: string;
	/** The route's pattern, not the address: it holds no data. */
	route: string | null;
	status: number;
	startedAt: number;
}): void {
	const { method, route, status, startedAt } = entry;
	const ms = Math.round((performance.now() - startedAt) * 10) / 10;
	const level = status >= 500 ? 'error' : 'info';
	log()[level]({ method, route: route ?? 'none', status, ms }, 'request');
}
