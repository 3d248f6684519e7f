/** Step of the trapezoidal rule: what it leaves open is e^(-pi^2/h^2) = 7e-18. */
const STEP = 0.5;

/** Nodes on each side of zero; e^-t^2 beyond is below 1e-19. */
const NODES = 14;

const WHOLE = nodesFrom(0);
const HALF = nodesFrom(0.5);

function nodesFrom(shift: number): { t: Float64Array; weight: Float64Array } {
	const t = Float64Array.from({ length: 2 * NODES + 1 }, (_, i) => STEP * (i - NODES + shift));
	return { t, weight: t.map((node) => Math.exp(-node * node)) };
}

/**
 * Faddeeva function w(z) = e^(-z^2) erfc(-i z) for Im z >= 0, by the trapezoidal rule of
 * `w = (i/pi) int e^(-t^2)/(z - t) dt` and the residue at its pole (Matta and Reichel, Math. Comp. 25, 339, 1971); whole or
 * half nodes, whichever stay clear of the pole. The real part is a sum of positive terms, so it keeps its relative accuracy
 * (about 1e-15) where the imaginary part is far larger.
 *
 * @throws RangeError for Im z < 0
 */
export function faddeeva(x: number, y: number): { re: number; im: number } {
	if (!(y >= 0)) throw new RangeError('w(z) is computed for Im z >= 0');
	const phase = Math.abs(x / STEP - Math.round(x / STEP));
	const onHalf = phase < 0.25;
	const { t, weight } = onHalf ? HALF : WHOLE;
	let re = 0;
	let im = 0;
	for (let i = 0; i < t.length; i++) {
		const d = x - t[i];
		const share = weight[i] / (d * d + y * y);
		re += share;
		im += d * share;
	}
	re *= (STEP * y) / Math.PI;
	im *= STEP / Math.PI;
	if (y >= Math.PI / STEP) return { re, im };
	// 2 e^(-z^2)/(1 -+ e^(-2 pi i z/h)), numerator and denominator divided by what grows with y.
	const turn = (2 * Math.PI * x) / STEP;
	const grow = (2 * Math.PI * y) / STEP;
	const sign = onHalf ? 1 : -1;
	const fall = Math.exp(-grow);
	const size = 2 * Math.exp(y * y - x * x - grow);
	const numeratorPhase = -2 * x * y;
	const a = fall + sign * Math.cos(turn);
	const b = -sign * Math.sin(turn);
	const norm = a * a + b * b;
	const c = Math.cos(numeratorPhase);
	const s = Math.sin(numeratorPhase);
	return { re: re + (size * (c * a + s * b)) / norm, im: im + (size * (s * a - c * b)) / norm };
}
