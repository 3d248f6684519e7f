/**
 * Trapezoidal rule for integrals over s from 0 to infinity of e^{-s} times functions analytic for Re s > 0.
 *
 *     s(u) = exp(u - exp(u0 - u)),   u = j h,   u0 = ln(scale)
 *
 * Above `scale` the lattice is even in ln s, so structure at every scale is met with the same density; below it s
 * falls doubly exponentially, which asks the integrand to be analytic in a disc of about that radius around zero.
 * In u the integrand is analytic in a strip of half-width pi/2, so the error falls like exp(-pi^2/h) (Takahasi and
 * Mori 1974; methods.md section 9). Sums over the even and the odd nodes are two rules of step 2h: half their
 * difference is the error of those, about the square root of the error of the whole. A lattice shifted by h/2 errs with
 * the opposite sign, and its half difference sees the other phase of what the first one sees.
 */
export interface LogLattice {
	count: number;
	s: Float64Array;
	/** h ds/du, without the exponential. */
	weight: Float64Array;
	/** e^{-s}. */
	decay: Float64Array;
}

/** Where e^{-s} s^4 no longer matters against one part in 10^17. */
const HIGHEST = 52;

/**
 * @param step   h, 0.1..1
 * @param scale  radius of the disc around s = 0 where the integrand is analytic, 1e-30..1
 * @param cut    what may be left out at the upper end, relative
 * @param floor  s ds below which nothing is asked for
 * @param shift  0 or 1/2: nodes at u = (j + shift) h
 */
export function logLattice(step: number, scale: number, cut: number, floor = cut, shift = 0): LogLattice {
	const u0 = Math.log(scale);
	const highest = Math.min(HIGHEST, 4 - 1.35 * Math.log(cut));
	const place = (u: number): number => Math.exp(u - Math.exp(u0 - u));
	let last = Math.ceil(Math.log(highest) / step);
	while (place((last + shift) * step) > highest) last--;
	// Downwards until the slope of the map, the measure of what is left out, has died.
	const slope = (u: number): number => place(u) * (1 + Math.exp(u0 - u));
	let first = last;
	while (slope((first - 1 + shift) * step) > floor) first--;
	const even = last - first + 1 + ((last - first + 1) % 2);
	const s = new Float64Array(even);
	const weight = new Float64Array(even);
	const decay = new Float64Array(even);
	for (let i = 0; i < even; i++) {
		const u = (last - even + 1 + i + shift) * step;
		s[i] = place(u);
		weight[i] = step * slope(u);
		decay[i] = Math.exp(-s[i]);
	}
	return { count: even, s, weight, decay };
}
