import { MOST_INTERFACES } from '../reflection/recursion.ts';

/**
 * One polarisation of a stack at one wave number: its reflection and the derivative of it to the permittivity of each place,
 * 0 the medium, then the layers, last the substrate. methods.md section 10 for a half-space; for stacks the chain rule
 * through the recursion of section 3, run forwards once for all places:
 *
 *     rho_b = (r_b + s)/(1 + r_b s),  s = rho_{b+1} e^{-x_b}
 *     d rho_b = [(1 - s^2) dr_b + (1 - r_b^2) ds]/(1 + r_b s)^2,  ds = e^{-x_b} (d rho_{b+1} - rho_{b+1} dx_b)
 */
export interface StackResponse {
	/** Interfaces seen; the last one ends the stack. */
	last: number;
	/** Interface b between place b - 1 and place b, as quotients of admittances: r, 1 + r, 1 - r. */
	r: Float64Array;
	plus: Float64Array;
	minus: Float64Array;
	/** dr_b to the permittivity before and behind it. */
	before: Float64Array;
	behind: Float64Array;
	/** x_b of the layer behind interface b, and its derivative to that layer's own permittivity. */
	depth: Float64Array;
	deeper: Float64Array;
	/** Results. */
	reflection: number;
	/** One a place. */
	derivative: Float64Array;
}

const row = (): Float64Array => new Float64Array(MOST_INTERFACES);

export const stackResponse = (): StackResponse => ({
	last: 0,
	...{ r: row(), plus: row(), minus: row(), before: row(), behind: row(), depth: row(), deeper: row() },
	reflection: 0,
	derivative: row()
});

/** Sets interface b from the admittances: r = (onward - back)/(onward + back). */
export function setAdmittances(
	into: StackResponse,
	b: number,
	difference: number,
	onward: number,
	back: number
): void {
	const sum = onward + back;
	into.r[b] = difference / sum;
	into.plus[b] = (2 * onward) / sum;
	into.minus[b] = (2 * back) / sum;
}

/** An interface that reflects wholly, whatever the permittivities. */
export function setWhole(into: StackResponse, b: number, r: 1 | -1): void {
	into.r[b] = r;
	into.plus[b] = 1 + r;
	into.minus[b] = 1 - r;
	into.before[b] = 0;
	into.behind[b] = 0;
}

const seen = row();

/** Reflection of the whole stack and its derivatives from the interfaces that are set. */
export function respond(into: StackResponse): void {
	const { last, r, plus, minus, before, behind, depth, deeper, derivative } = into;
	let rho = r[last];
	for (let b = last - 1; b >= 1; b--) {
		const s = rho * Math.exp(-depth[b]);
		seen[b] = s;
		const A = plus[b] * (1 + s);
		const B = minus[b] * (1 - s);
		rho = A + B === 0 ? 0 : (A - B) / (A + B);
	}
	into.reflection = rho;
	derivative.fill(0, 0, last + 1);
	let share = 1;
	for (let b = 1; b <= last; b++) {
		const s = b < last ? seen[b] : 0;
		// 1 + r s as half the sum of positive products: nothing cancels where a thin film reflects almost wholly.
		const divisor = (plus[b] * (1 + s) + minus[b] * (1 - s)) / 2;
		const front = (share * (1 - s) * (1 + s)) / (divisor * divisor);
		derivative[b - 1] += front * before[b];
		derivative[b] += front * behind[b];
		if (b === last) break;
		const onward = (share * plus[b] * minus[b]) / (divisor * divisor);
		derivative[b] -= onward * s * deeper[b];
		share = onward * Math.exp(-depth[b]);
	}
}
