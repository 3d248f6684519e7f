/**
 * The interpolant of a table of eps''(omega): a power law between two positive points, a straight line where one of
 * them is zero (methods.md section 7).
 */
export interface Segment {
	from: number;
	to: number;
	kind: 'power' | 'linear';
	/** eps'' at `from`. */
	start: number;
	/** Exponent of omega, or slope per rad/s. */
	growth: number;
}

export const segmentAt = ({ from, kind, start, growth }: Segment, omega: number): number =>
	kind === 'power' ? start * Math.pow(omega / from, growth) : start + growth * (omega - from);

export function segmentsOf(omegas: readonly number[], epsilon2: readonly number[]): Segment[] {
	const segments: Segment[] = [];
	for (let i = 0; i + 1 < omegas.length; i++) {
		const [from, to, start, end] = [omegas[i], omegas[i + 1], epsilon2[i], epsilon2[i + 1]];
		if (start === 0 && end === 0) continue;
		if (start > 0 && end > 0) {
			segments.push({ from, to, kind: 'power', start, growth: Math.log(end / start) / Math.log(to / from) });
		} else {
			segments.push({ from, to, kind: 'linear', start, growth: (end - start) / (to - from) });
		}
	}
	return segments;
}
