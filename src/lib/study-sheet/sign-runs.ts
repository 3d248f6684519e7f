import type { Series } from './series.ts';

/** Stretches of a curve with one sign, for the sign bars and for the solid and hollow pieces of its line. */

export interface SignRun {
	fromNm: number;
	toNm: number;
	sign: -1 | 0 | 1;
}

/** Where the straight line between two points of opposite sign crosses zero, on the logarithmic axis. */
export function crossing(d1: number, v1: number, d2: number, v2: number): number {
	return d1 * (d2 / d1) ** (v1 / (v1 - v2));
}

export function signRuns({ separationsNm, values }: Pick<Series, 'separationsNm' | 'values'>): SignRun[] {
	const runs: SignRun[] = [];
	for (let index = 0; index < values.length; index++) {
		const sign = Math.sign(values[index]) as SignRun['sign'];
		const current = runs[runs.length - 1];
		if (current && current.sign === sign) {
			current.toNm = separationsNm[index];
			continue;
		}
		let fromNm = separationsNm[index];
		if (current) {
			const before = index - 1;
			fromNm = crossing(separationsNm[before], values[before], separationsNm[index], values[index]);
			current.toNm = fromNm;
		}
		runs.push({ fromNm, toNm: separationsNm[index], sign });
	}
	return runs;
}

/** Stretches in which two or more curves disagree about the sign. */
export function disagreement(all: readonly SignRun[][]): { fromNm: number; toNm: number }[] {
	const edges = [...new Set(all.flat().flatMap(({ fromNm, toNm }) => [fromNm, toNm]))].sort((a, b) => a - b);
	const found: { fromNm: number; toNm: number }[] = [];
	for (let index = 0; index + 1 < edges.length; index++) {
		const [fromNm, toNm] = [edges[index], edges[index + 1]];
		const middle = Math.sqrt(fromNm * toNm);
		const signs = all.flatMap((runs) => runs.filter((run) => run.fromNm <= middle && middle <= run.toNm));
		if (new Set(signs.map(({ sign }) => sign)).size < 2) continue;
		const last = found[found.length - 1];
		if (last && last.toNm === fromNm) last.toNm = toNm;
		else found.push({ fromNm, toNm });
	}
	return found;
}
