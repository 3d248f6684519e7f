import type { LogLattice } from '../numerics/log-lattice.ts';

/** Once the round trip through the layers has decayed by e^-40, what lies behind is not seen (4e-18). */
export const OPAQUE = 40;

/**
 * Layers from the gap outwards at one frequency: index 0 is the medium, then the layers, last the substrate.
 * `ideal` marks an ideal conductor at the end of the stack.
 */
export interface StackAtFrequency {
	/** Number of layers. */
	layers: number;
	chi: Float64Array;
	mu: Float64Array;
	/** t/d of each layer, index 1..layers. */
	thickness: Float64Array;
	ideal: boolean;
}

/** Below this a layer takes so little off a wave that 1 - e^-x is the number to work with. */
const THIN = 0.5;

/**
 * One layer in front of what lies behind: `(front + behind e^-x)/(1 + front behind e^-x)`, x = 2 kappa t, written with
 * 1 - e^-x for thin layers, whose front and back nearly cancel.
 */
export function throughLayer(front: number, behind: number, x: number): number {
	if (x > THIN) {
		const seen = behind * Math.exp(-x);
		return (front + seen) / (1 + front * seen);
	}
	const lost = behind * -Math.expm1(-x);
	return (front + behind - lost) / (1 + front * (behind - lost));
}

/** Work space of one stack. */
export const stackAtFrequency = (layers: number): StackAtFrequency => ({
	layers,
	chi: new Float64Array(layers + 2),
	mu: new Float64Array(layers + 2).fill(1),
	thickness: new Float64Array(layers + 2),
	ideal: false
});

const kappas = new Float64Array(64);

/**
 * Reflection of a stack (methods.md section 3), recursion from the back:
 *
 *     rho_{j-1} = (r_{j-1,j} + rho_j e)/(1 + r_{j-1,j} rho_j e),   e = exp(-2 kappa_j t_j)
 *
 * written with 1 - e where that is small, so that a layer much thinner than its decay length is seen as the small
 * change it is. Interfaces as in half-space.ts.
 */
export function stackReflection(
	lattice: LogLattice,
	y0: number,
	X: number,
	stack: StackAtFrequency,
	rTM: Float64Array,
	rTE: Float64Array
): void {
	const { layers, chi, mu, thickness, ideal } = stack;
	for (let i = 0; i < lattice.count; i++) {
		const s = lattice.s[i];
		const K = s * (2 * y0 + s);
		kappas[0] = y0 + s;
		// Inwards until nothing further is seen.
		let depth = 0;
		let last = 0;
		while (last < layers && depth < OPAQUE) {
			last++;
			kappas[last] = Math.sqrt(K + (1 + chi[last]) * mu[last] * X);
			depth += kappas[last] * thickness[last];
		}
		// Behind the last layer seen: nothing, an ideal conductor, or the substrate.
		const behind = depth < OPAQUE && ideal ? 1 : 0;
		let tm = behind;
		let te = -behind;
		if (depth < OPAQUE && !ideal) {
			last++;
			kappas[last] = Math.sqrt(K + (1 + chi[last]) * mu[last] * X);
		}
		for (let b = last; b >= 1; b--) {
			const a = b - 1;
			const epsA = 1 + chi[a];
			const epsB = 1 + chi[b];
			const dEps = chi[b] - chi[a];
			const dMu = mu[b] - mu[a];
			const tmDen = epsB * kappas[a] + epsA * kappas[b];
			const teDen = mu[b] * kappas[a] + mu[a] * kappas[b];
			const rTm =
				(dEps * (epsA + epsB) * K + epsA * epsB * X * (dEps * mu[a] - epsA * dMu)) / (tmDen * tmDen);
			const rTe =
				(dMu * (mu[a] + mu[b]) * K + mu[a] * mu[b] * X * (dMu * epsA - mu[a] * dEps)) / (teDen * teDen);
			if (b > layers) {
				tm = rTm;
				te = rTe;
				continue;
			}
			const x = kappas[b] * thickness[b];
			tm = throughLayer(rTm, tm, x);
			te = throughLayer(rTe, te, x);
		}
		rTM[i] = tm;
		rTE[i] = te;
	}
}
