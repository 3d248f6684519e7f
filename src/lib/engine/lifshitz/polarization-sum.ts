import { logOneMinus } from '../numerics/log-one-minus.ts';
import type { LogLattice } from '../numerics/log-lattice.ts';

/**
 * Beyond this R e^-y the difference 1 - R e^-y is rounding: y + (1 - R e^-y) stands for it, never zero. So close to the
 * origin the integrands weigh less than 1e-24.
 */
const NEAR_ONE = 1 - 1e-12;

/**
 * For one frequency and one polarisation, over y = y0 + s (methods.md section 1):
 *
 *     F: int y   ln(1 - R e^-y) dy     P: int y^2 R e^-y/(1 - R e^-y) dy     G: int y^3 R e^-y/(1 - R e^-y)^2 dy
 *
 * with R = r1 r2. Sums over even and odd nodes stay apart: their difference measures the error of the rule.
 *
 * @param out  F even, F odd, P even, P odd, G even, G odd; overwritten
 */
export function polarizationSum(
	lattice: LogLattice,
	y0: number,
	r1: Float64Array,
	r2: Float64Array,
	out: Float64Array
): void {
	const { count, s, weight, decay } = lattice;
	const decay0 = Math.exp(-y0);
	let f0 = 0;
	let f1 = 0;
	let p0 = 0;
	let p1 = 0;
	let g0 = 0;
	let g1 = 0;
	for (let i = 0; i < count; i += 2) {
		let y = y0 + s[i];
		let wy = weight[i] * y;
		let z = r1[i] * r2[i] * decay0 * decay[i];
		let d = z < NEAR_ONE ? 1 / (1 - z) : 1 / (y + Math.abs(1 - z));
		f0 += wy * (z < NEAR_ONE ? logOneMinus(z) : -Math.log(d));
		let p = wy * y * z * d;
		p0 += p;
		g0 += p * y * d;
		const j = i + 1;
		y = y0 + s[j];
		wy = weight[j] * y;
		z = r1[j] * r2[j] * decay0 * decay[j];
		d = z < NEAR_ONE ? 1 / (1 - z) : 1 / (y + Math.abs(1 - z));
		f1 += wy * (z < NEAR_ONE ? logOneMinus(z) : -Math.log(d));
		p = wy * y * z * d;
		p1 += p;
		g1 += p * y * d;
	}
	out[0] = f0;
	out[1] = f1;
	out[2] = p0;
	out[3] = p1;
	out[4] = g0;
	out[5] = g1;
}

/** P alone of the same integrals, no logarithm; F and G are left at zero. */
export function polarizationPressure(
	lattice: LogLattice,
	y0: number,
	r1: Float64Array,
	r2: Float64Array,
	out: Float64Array
): void {
	const { count, s, weight, decay } = lattice;
	const decay0 = Math.exp(-y0);
	let p0 = 0;
	let p1 = 0;
	for (let i = 0; i < count; i += 2) {
		let y = y0 + s[i];
		let z = r1[i] * r2[i] * decay0 * decay[i];
		let d = z < NEAR_ONE ? 1 / (1 - z) : 1 / (y + Math.abs(1 - z));
		p0 += weight[i] * y * y * z * d;
		const j = i + 1;
		y = y0 + s[j];
		z = r1[j] * r2[j] * decay0 * decay[j];
		d = z < NEAR_ONE ? 1 / (1 - z) : 1 / (y + Math.abs(1 - z));
		p1 += weight[j] * y * y * z * d;
	}
	out[0] = 0;
	out[1] = 0;
	out[2] = p0;
	out[3] = p1;
	out[4] = 0;
	out[5] = 0;
}

/** What is computed of a separation: pressure alone costs no logarithms. */
export type Quantities = 'all' | 'pressure';

export const sumOf = (quantities: Quantities): typeof polarizationSum =>
	quantities === 'all' ? polarizationSum : polarizationPressure;

/**
 * The same integrals with R replaced by what rounding may do to it, noise2 |r1| + noise1 |r2|: for stacks, whose
 * coefficient may be a small difference of larger ones.
 *
 * @param noise1, noise2  absolute errors of r1 and r2, fading like e^{-y silent} behind matched layers
 * @param out             F, P, G; added to
 */
export function addPolarizationNoise(
	lattice: LogLattice,
	y0: number,
	r1: Float64Array,
	r2: Float64Array,
	noise1: number,
	noise2: number,
	silent1: number,
	silent2: number,
	out: Float64Array
): void {
	const { count, s, weight, decay } = lattice;
	const decay0 = Math.exp(-y0);
	for (let i = 0; i < count; i++) {
		const y = y0 + s[i];
		const e = decay0 * decay[i];
		const d = 1 / (1 - r1[i] * r2[i] * e);
		const n1 = silent1 > 0 ? noise1 * Math.exp(-y * silent1) : noise1;
		const n2 = silent2 > 0 ? noise2 * Math.exp(-y * silent2) : noise2;
		const f = weight[i] * y * e * d * (n2 * Math.abs(r1[i]) + n1 * Math.abs(r2[i]) + n1 * n2);
		out[0] += f;
		out[1] += f * y;
		out[2] += f * y * y * d;
	}
}
