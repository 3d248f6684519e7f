import { gaussRule } from '../numerics/gauss-rule.ts';
import { NO_STATIC_LIMIT, type Susceptibility } from './susceptibility.ts';

/**
 * A rational `omega eps''(omega)` that begins at an edge and falls like omega^-2 in the end: what the band models of
 * amorphous matter have in common.
 */
export interface GappedAbsorption {
	/** rad/s, > 0: no absorption below. */
	edge: number;
	/** omega eps'' in rad/s, as a formula that also holds below the edge. */
	density(omega: number): number;
	/** Poles of the density, real part and size of the imaginary part, rad/s. */
	poles: readonly { re: number; im: number }[];
}

const RULE = gaussRule(12, Infinity);

/** Length of a panel by the distance to the nearest singularity: errors fall like 4.4^-24. */
const STRIDE = 0.6;

/** Beyond this multiple of the last pole only the power law is left, and panels double. */
const FAR = 8;

/** Octaves of the power law: what lies beyond is below 1e-15 of the strength. */
const OCTAVES = 50;

interface Nodes {
	omega: Float64Array;
	/** Weight of d omega. */
	weight: Float64Array;
	/** End of the last panel. */
	end: number;
}

function nodesOf({ edge, poles }: GappedAbsorption): Nodes {
	const omega: number[] = [];
	const weight: number[] = [];
	const panel = (from: number, to: number): void => {
		const half = (to - from) / 2;
		for (let i = 0; i < RULE.nodes.length; i++) {
			omega.push(from + half * (1 + RULE.nodes[i]));
			weight.push(2 * half * RULE.weights[i]);
		}
	};
	const far = FAR * Math.max(edge, ...poles.map(({ re, im }) => Math.hypot(re, im)));
	let at = edge;
	while (at < far) {
		// 1/(omega^2 + xi^2) is singular on the imaginary axis, at the distance omega.
		const clear = Math.min(at, ...poles.map(({ re, im }) => Math.hypot(at - re, im)));
		const to = at + STRIDE * clear;
		panel(at, to);
		at = to;
	}
	for (let k = 0; k < OCTAVES; k++) {
		panel(at, 2 * at);
		at *= 2;
	}
	return { omega: Float64Array.from(omega), weight: Float64Array.from(weight), end: at };
}

/**
 * Kramers-Kronig transform of an absorption that begins at an edge, by quadrature (methods.md section 7: the printed real
 * parts of these models are not analytic term by term, so they are not continued). All terms are positive: relative
 * error about 1e-15 at every xi.
 */
export function gapped(absorption: GappedAbsorption): Susceptibility {
	const { edge, density } = absorption;
	const { omega, weight, end } = nodesOf(absorption);
	const strengths = omega.map((w, i) => (2 / Math.PI) * weight[i] * density(w));
	const squares = omega.map((w) => w * w);
	const atXi = (xi: number): number => {
		const xi2 = xi * xi;
		let sum = 0;
		for (let i = 0; i < strengths.length; i++) sum += strengths[i] / (squares[i] + xi2);
		return sum;
	};
	/** eps' - 1: the density at w is subtracted, so that the integrand stays smooth, and added as a logarithm. */
	const principal = (w: number): number => {
		const near = w > edge / 2;
		// On the edge itself the logarithm is infinite and its factor zero.
		const at = near && Math.abs(w / edge - 1) < 1e-9 ? edge * (1 + 2e-9) : w;
		const subtracted = near ? density(at) : 0;
		let sum = 0;
		for (let i = 0; i < omega.length; i++) {
			if (omega[i] === at) continue;
			sum += (weight[i] * (density(omega[i]) - subtracted)) / ((omega[i] - at) * (omega[i] + at));
		}
		const logarithm = near
			? (subtracted / (2 * at)) * Math.log(Math.abs(((end - at) * (edge + at)) / ((end + at) * (edge - at))))
			: 0;
		return (2 / Math.PI) * (sum + logarithm);
	};
	return {
		atXi,
		atOmega: (w) => ({ re: principal(w), im: w > edge ? density(w) / w : 0 }),
		atZero: { ...NO_STATIC_LIMIT, finite: atXi(0) },
		knots: [],
		ulps: 48
	};
}

/** Poles of 1/[(omega^2 - w0^2)^2 + c^2 omega^2] in the right half plane. */
export function resonancePoles(resonance: number, broadening: number): { re: number; im: number }[] {
	const shift = resonance * resonance - (broadening * broadening) / 4;
	if (shift > 0) return [{ re: Math.sqrt(shift), im: broadening / 2 }];
	const spread = Math.sqrt(-shift);
	return [
		{ re: 0, im: broadening / 2 - spread },
		{ re: 0, im: broadening / 2 + spread }
	];
}
