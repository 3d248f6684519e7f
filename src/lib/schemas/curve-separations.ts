import { curveSeparations } from './study-request.ts';
import type { Study } from './study.ts';

/** The separations of a curve one by one, with those that the reader marked: what a record and a sheet are computed at. */
export function curveSeparationsNm(study: Study): number[] {
	const { from, to, count } = curveSeparations(study);
	const curve = Array.from({ length: count }, (_, index) =>
		Number((from * (to / from) ** (index / (count - 1))).toPrecision(12))
	);
	const marked = [study.atNm, study.parkedNm, ...study.marks.map(({ separationNm }) => separationNm)];
	// The last digits of a rounded end must not leave the range that is allowed.
	const wanted = [from, to, ...curve.slice(1, -1), ...marked.filter((one) => one !== undefined)];
	return [...new Set(wanted)].filter((one) => one >= from && one <= to).sort((a, b) => a - b);
}
