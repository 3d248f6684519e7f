import type { LogLattice } from '../numerics/log-lattice.ts';
import { interfaces, MOST_INTERFACES, reflectionFromBack, type Interfaces } from './recursion.ts';

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

/** Work space of one stack. */
export const stackAtFrequency = (layers: number): StackAtFrequency => ({
	layers,
	chi: new Float64Array(layers + 2),
	mu: new Float64Array(layers + 2).fill(1),
	thickness: new Float64Array(layers + 2),
	ideal: false
});

const kappas = new Float64Array(MOST_INTERFACES);
const depths = new Float64Array(MOST_INTERFACES);
const tm = interfaces();
const te = interfaces();

/**
 * Reflection of a stack over y = y0 + s: interfaces as in half-space.ts, put together by recursion.ts. Layers behind an
 * opaque part of the stack are not looked at.
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
		let depth = 0;
		let last = 0;
		while (last <= layers && depth < OPAQUE) {
			last++;
			if (last > layers && ideal) {
				setIdeal(tm, last, 1);
				setIdeal(te, last, -1);
				break;
			}
			kappas[last] = Math.sqrt(K + (1 + chi[last]) * mu[last] * X);
			setInterface(last, K, X, chi, mu);
			depths[last] = kappas[last] * thickness[last];
			depth += depths[last];
		}
		rTM[i] = reflectionFromBack(tm, last, depths);
		rTE[i] = reflectionFromBack(te, last, depths);
	}
}

function setIdeal(into: Interfaces, b: number, r: number): void {
	into.r[b] = r;
	into.plus[b] = 1 + r;
	into.minus[b] = 1 - r;
}

/** Interface between place b - 1 and place b. */
function setInterface(b: number, K: number, X: number, chi: Float64Array, mu: Float64Array): void {
	const a = b - 1;
	const epsA = 1 + chi[a];
	const epsB = 1 + chi[b];
	const muA = mu[a];
	const muB = mu[b];
	const dEps = chi[b] - chi[a];
	const dMu = muB - muA;
	const tmA = epsA * kappas[b];
	const tmB = epsB * kappas[a];
	const tmDen = 1 / (tmA + tmB);
	const teA = muA * kappas[b];
	const teB = muB * kappas[a];
	const teDen = 1 / (teA + teB);
	tm.r[b] = (dEps * (epsA + epsB) * K + epsA * epsB * X * (dEps * muA - epsA * dMu)) * tmDen * tmDen;
	tm.plus[b] = 2 * tmB * tmDen;
	tm.minus[b] = 2 * tmA * tmDen;
	te.r[b] = (dMu * (muA + muB) * K + muA * muB * X * (dMu * epsA - muA * dEps)) * teDen * teDen;
	te.plus[b] = 2 * teB * teDen;
	te.minus[b] = 2 * teA * teDen;
}
