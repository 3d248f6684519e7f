import type { LogLattice } from '../numerics/log-lattice.ts';
import { CANCELLING, MOST_INTERFACES, THIN } from './recursion.ts';
import {
	coatAt,
	firstKappa,
	kappas,
	keeps,
	loses,
	MOST_NODES,
	squares,
	startWaves,
	waveAt
} from './waves.ts';

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

const row = (): Float64Array => new Float64Array(MOST_NODES);
/** 1 + rho and 1 - rho of what has been put together so far. */
const [aboveTM, belowTM, aboveTE, belowTE] = [row(), row(), row(), row()];

/**
 * Reflection of a stack over y = y0 + s: interfaces as in half-space.ts, put together from the back as in recursion.ts. Layers
 * behind an opaque part of the stack are not looked at. All nodes go through one interface before the next one is
 * taken: what an interface has of its own stays in registers.
 */
export function stackReflection(
	lattice: LogLattice,
	y0: number,
	X: number,
	stack: StackAtFrequency,
	rTM: Float64Array,
	rTE: Float64Array
): void {
	const { count } = lattice;
	const last = penetrate(lattice, y0, X, stack);
	if (last > stack.layers && stack.ideal) startIdeal(count, rTM, rTE);
	else startInterface(count, X, stack, last, rTM, rTE);
	for (let b = last - 1; b >= 1; b--) addInterface(count, X, stack, b, rTM, rTE);
}

/** Finds the waves of every place from the gap inwards; the last interface that any node sees. */
function penetrate(lattice: LogLattice, y0: number, X: number, stack: StackAtFrequency): number {
	const { layers, chi, mu, thickness, ideal } = stack;
	startWaves(lattice, y0, X);
	let depth = 0;
	for (let b = 0; b <= layers + 1; b++) {
		if (b > layers && ideal) break;
		waves[b] = waveAt(chi[b], mu[b]);
		if (b === 0 || b > layers) continue;
		coats[b] = coatAt(waves[b], thickness[b]);
		// The first node decays slowest: once it sees nothing behind, none does.
		depth += firstKappa(waves[b]) * thickness[b];
		if (depth >= OPAQUE) return b;
	}
	return layers + 1;
}

/** Where the waves and coats of this stack's places are kept. */
const waves = new Int32Array(MOST_INTERFACES);
const coats = new Int32Array(MOST_INTERFACES);

function startIdeal(count: number, rTM: Float64Array, rTE: Float64Array): void {
	rTM.fill(1, 0, count);
	rTE.fill(-1, 0, count);
	aboveTM.fill(2, 0, count);
	belowTM.fill(0, 0, count);
	aboveTE.fill(0, 0, count);
	belowTE.fill(2, 0, count);
}

/** The interface at the back: nothing comes from behind it. */
function startInterface(
	count: number,
	X: number,
	{ chi, mu }: StackAtFrequency,
	b: number,
	rTM: Float64Array,
	rTE: Float64Array
): void {
	setNumerators(chi, mu, b, X);
	const epsA = 1 + chi[b - 1];
	const epsB = 1 + chi[b];
	const muA = mu[b - 1];
	const muB = mu[b];
	const tmK = numerators[0];
	const tmX = numerators[1];
	const teK = numerators[2];
	const teX = numerators[3];
	const before = waves[b - 1];
	const behind = waves[b];
	for (let i = 0; i < count; i++) {
		const K = squares[i];
		const onwardTM = epsB * kappas[before + i];
		const backTM = epsA * kappas[behind + i];
		const tm = 1 / (onwardTM + backTM);
		rTM[i] = (tmK * K + tmX) * tm * tm;
		aboveTM[i] = 2 * onwardTM * tm;
		belowTM[i] = 2 * backTM * tm;
		const onwardTE = muB * kappas[before + i];
		const backTE = muA * kappas[behind + i];
		const te = 1 / (onwardTE + backTE);
		rTE[i] = (teK * K + teX) * te * te;
		aboveTE[i] = 2 * onwardTE * te;
		belowTE[i] = 2 * backTE * te;
	}
}

/**
 * Interface b and the layer behind it, in front of what is there. With r = (u - v)/(u + v) the recursion of recursion.ts has
 * A : B = u (1 + rho e) : v (1 - rho e).
 */
function addInterface(
	count: number,
	X: number,
	{ chi, mu }: StackAtFrequency,
	b: number,
	rTM: Float64Array,
	rTE: Float64Array
): void {
	setNumerators(chi, mu, b, X);
	const epsA = 1 + chi[b - 1];
	const epsB = 1 + chi[b];
	const muA = mu[b - 1];
	const muB = mu[b];
	const tmK = numerators[0];
	const tmX = numerators[1];
	const teK = numerators[2];
	const teX = numerators[3];
	const before = waves[b - 1];
	const behind = waves[b];
	const coat = coats[b];
	for (let i = 0; i < count; i++) {
		const K = squares[i];
		const keep = keeps[coat + i];
		const lose = loses[coat + i];
		const thin = lose <= THIN;
		let rho = rTM[i];
		let seen = rho * keep;
		let u = epsB * kappas[before + i];
		let v = epsA * kappas[behind + i];
		let uv = u + v;
		let A = u * (thin ? aboveTM[i] - rho * lose : 1 + seen);
		let B = v * (thin ? belowTM[i] + rho * lose : 1 - seen);
		let one = 1 / uv;
		let two = 1 / (A + B);
		let front = (tmK * K + tmX) * one * one;
		rTM[i] = front * seen < CANCELLING ? (A - B) * two : (front + seen) * uv * two;
		aboveTM[i] = 2 * A * two;
		belowTM[i] = 2 * B * two;
		rho = rTE[i];
		seen = rho * keep;
		u = muB * kappas[before + i];
		v = muA * kappas[behind + i];
		uv = u + v;
		A = u * (thin ? aboveTE[i] - rho * lose : 1 + seen);
		B = v * (thin ? belowTE[i] + rho * lose : 1 - seen);
		one = 1 / uv;
		two = 1 / (A + B);
		front = (teK * K + teX) * one * one;
		rTE[i] = front * seen < CANCELLING ? (A - B) * two : (front + seen) * uv * two;
		aboveTE[i] = 2 * A * two;
		belowTE[i] = 2 * B * two;
	}
}

/** Numerators of half-space.ts for the interface between places b - 1 and b; an array, because objects of doubles cost memory. */
const numerators = new Float64Array(4);

function setNumerators(chi: Float64Array, mu: Float64Array, b: number, X: number): void {
	const a = b - 1;
	const epsA = 1 + chi[a];
	const epsB = 1 + chi[b];
	const dEps = chi[b] - chi[a];
	const dMu = mu[b] - mu[a];
	numerators[0] = dEps * (epsA + epsB);
	numerators[1] = epsA * epsB * X * (dEps * mu[a] - epsA * dMu);
	numerators[2] = dMu * (mu[a] + mu[b]);
	numerators[3] = mu[a] * mu[b] * X * (dMu * epsA - mu[a] * dEps);
}
