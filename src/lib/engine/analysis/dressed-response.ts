import { MOST_INTERFACES } from '../reflection/recursion.ts';
import type { StackResponse } from './stack-response.ts';

/**
 * One polarisation of a stack whose places may be uniaxial or carry a sheet: its reflection and the derivatives of it. Every
 * interface is a quotient of admittances Y, r = +-(Y_b - Y_a)/(Y_b + Y_a), + in TM and - in TE, so that with the
 * derivatives of ln Y and of the depths x = 2 kappa t of each place all others follow by the chain rule:
 *
 *     dr_b = +-(1 - r_b^2)/2 (d ln Y_b - d ln Y_a)
 *     rho = (r + s)/(1 + r s),  d rho = [(1 - s^2) dr + (1 - r^2) ds]/(1 + r s)^2
 *     u = rho seen through a sheet of admittance c Y_a in front (reflection/covered-recursion.ts), d ln c = d ln g - d ln Y_a:
 *     TM  1 - u = 2 B/(2 + c B), B = 1 - rho;   TE  1 + u = 2 A/(2 + c A), A = 1 + rho
 *     du/d rho = 4/D^2,  du/dc = +-2 q^2/D^2,   D = 2 + c q with q = B or A
 */
export interface DressedResponse extends StackResponse {
	/** Of place j, 0 the medium: d ln Y and dx to the permittivity in the plane and to that along the normal. */
	admittance: Float64Array;
	admittanceByNormal: Float64Array;
	deeperByNormal: Float64Array;
	/** c of the sheet in front of interface b; 0 where there is none. */
	cover: Float64Array;
	/** Results, one a place: to the permittivity along the normal, and to the logarithm of the sheet's conductivity. */
	byNormal: Float64Array;
	bySheet: Float64Array;
}

const row = (): Float64Array => new Float64Array(MOST_INTERFACES);

export const dressedResponse = (): DressedResponse => ({
	last: 0,
	...{ r: row(), plus: row(), minus: row(), before: row(), behind: row(), depth: row(), deeper: row() },
	...{ admittance: row(), admittanceByNormal: row(), deeperByNormal: row(), cover: row() },
	...{ derivative: row(), byNormal: row(), bySheet: row() },
	reflection: 0
});

/** Reflection of place b behind place b - 1: what is seen, and what a sheet in front sees of it. */
const seen = row();
const divisor = row();
const facing = row();

/**
 * Reflection of the whole stack and its derivatives from the interfaces that are set.
 *
 * @param uniaxial  whether place j has a permittivity of its own along its normal; else both derivatives are added up
 */
export function respondDressed(
	into: DressedResponse,
	polarisation: 'te' | 'tm',
	uniaxial: (place: number) => boolean
): void {
	fromBack(into, polarisation);
	const { last, plus, minus, depth, deeper, deeperByNormal, cover } = into;
	const { admittance, admittanceByNormal, derivative, byNormal, bySheet } = into;
	for (const one of [derivative, byNormal, bySheet]) one.fill(0, 0, last + 1);
	const sign = polarisation === 'tm' ? 1 : -1;
	let share = 1;
	for (let b = 1; b <= last; b++) {
		if (cover[b] > 0) {
			const D = 2 + cover[b] * facing[b];
			const bySize = (share * sign * 2 * facing[b] * facing[b] * cover[b]) / (D * D);
			bySheet[b] = bySize;
			derivative[b - 1] -= bySize * admittance[b - 1];
			byNormal[b - 1] -= bySize * admittanceByNormal[b - 1];
			share *= 4 / (D * D);
		}
		const s = b < last ? seen[b] : 0;
		const square = divisor[b] * divisor[b];
		const crossing = plus[b] * minus[b];
		const front = (share * sign * (crossing / 2) * (1 - s) * (1 + s)) / square;
		derivative[b - 1] -= front * admittance[b - 1];
		byNormal[b - 1] -= front * admittanceByNormal[b - 1];
		derivative[b] += front * admittance[b];
		byNormal[b] += front * admittanceByNormal[b];
		if (b === last) break;
		const onward = (share * crossing) / square;
		derivative[b] -= onward * s * deeper[b];
		byNormal[b] -= onward * s * deeperByNormal[b];
		share = onward * Math.exp(-depth[b]);
	}
	for (let j = 0; j <= last; j++) {
		if (uniaxial(j)) continue;
		derivative[j] += byNormal[j];
		byNormal[j] = 0;
	}
}

/** The reflection, and on the way what each interface sees behind it; 1 + rho and 1 - rho are carried as sums of positives. */
function fromBack(into: DressedResponse, polarisation: 'te' | 'tm'): void {
	const { last, r, plus, minus, depth, cover } = into;
	let rho = 0;
	let above = 1;
	let below = 1;
	for (let b = last; b >= 1; b--) {
		if (b === last) {
			divisor[b] = 1;
			[rho, above, below] = [r[b], plus[b], minus[b]];
		} else {
			const lost = -rho * Math.expm1(-depth[b]);
			seen[b] = rho - lost;
			const A = plus[b] * (above - lost);
			const B = minus[b] * (below + lost);
			divisor[b] = (A + B) / 2;
			rho = A + B === 0 ? 0 : (A - B) / (A + B);
			above = A + B === 0 ? 1 : (2 * A) / (A + B);
			below = A + B === 0 ? 1 : (2 * B) / (A + B);
		}
		facing[b] = polarisation === 'tm' ? below : above;
		if (cover[b] === 0) continue;
		const D = 2 + cover[b] * facing[b];
		const less = (2 * facing[b]) / D;
		rho = polarisation === 'tm' ? 1 - less : less - 1;
		above = polarisation === 'tm' ? 2 - less : less;
		below = 2 - above;
	}
	into.reflection = rho;
}
