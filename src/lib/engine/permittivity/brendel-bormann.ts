import { faddeeva } from '../numerics/faddeeva.ts';
import { NO_STATIC_LIMIT, type Susceptibility } from './susceptibility.ts';

/** Resonances below this share of the centre are left out of the static value (our choice, methods.md section 7). */
const EXCLUDED = 0.2;

/** Panels and reach, in widths, of the integral behind the static value. */
const PANELS = 4000;
const REACH = 9;

/**
 * Lorentz oscillators whose resonances are spread by a normal distribution (Brendel and Bormann 1992). On the imaginary axis
 * `eps - 1 = sqrt(pi) f Re w(z)/(sqrt2 b s)` with `b^2 = xi^2 + gamma xi`, `z = (w0 + i b)/(sqrt2 s)` (methods.md section 7),
 * which is the mean of f/(x^2 + b^2) over x and therefore positive and falling.
 *
 * The distribution reaches x = 0, so the formula grows like e^(-w0^2/2 s^2)/b as xi falls: a conductivity that no
 * one measured. The n = 0 term takes the mean of f/x^2 over x > 0.2 w0 instead, and such a term never conducts.
 *
 * @param strength   f in (rad/s)^2, >= 0
 * @param resonance  w0 in rad/s, > 0
 * @param damping    gamma in rad/s, >= 0
 * @param width      s in rad/s, > 0: the standard deviation
 */
export function brendelBormann(
	strength: number,
	resonance: number,
	damping: number,
	width: number
): Susceptibility {
	const scale = Math.SQRT2 * width;
	const factor = (Math.sqrt(Math.PI) * strength) / scale;
	return {
		atXi: (xi) => {
			const b = Math.sqrt(xi * (xi + damping));
			return (factor * faddeeva(resonance / scale, b / scale).re) / b;
		},
		atOmega: (omega) => {
			// a = sqrt(omega^2 + i omega gamma), Im a >= 0; the smaller part from the larger one.
			const product = omega * damping;
			const re = Math.sqrt((Math.hypot(omega * omega, product) + omega * omega) / 2);
			const im = product / (2 * re);
			const one = faddeeva((re - resonance) / scale, im / scale);
			const other = faddeeva((re + resonance) / scale, im / scale);
			const [sumRe, sumIm] = [one.re + other.re, one.im + other.im];
			const norm = re * re + im * im;
			return {
				re: ((factor / 2) * (sumRe * im - sumIm * re)) / norm,
				im: ((factor / 2) * (sumRe * re + sumIm * im)) / norm
			};
		},
		atZero: { ...NO_STATIC_LIMIT, finite: strength * staticMean(resonance, width) },
		knots: [],
		ulps: 64
	};
}

/** Mean of 1/x^2 over x > 0.2 w0 of a normal distribution, by Simpson's rule. */
function staticMean(resonance: number, width: number): number {
	const from = Math.max(EXCLUDED * resonance, resonance - REACH * width);
	const step = (resonance + REACH * width - from) / PANELS;
	let sum = 0;
	for (let i = 0; i <= PANELS; i++) {
		const x = from + i * step;
		const weight = i === 0 || i === PANELS ? 1 : i % 2 === 1 ? 4 : 2;
		sum += (weight * Math.exp(-(((x - resonance) / width) ** 2) / 2)) / (x * x);
	}
	return (sum * step) / 3 / (width * Math.sqrt(2 * Math.PI));
}
