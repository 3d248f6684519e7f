import { fading } from '../numerics/fading.ts';
import type { LogLattice } from '../numerics/log-lattice.ts';
import { MOST_INTERFACES } from './recursion.ts';

/**
 * Waves of one frequency over the nodes of a lattice: 2 d kappa of a substance, and what a layer of it keeps and loses. Both
 * bodies of an arrangement are often made of the same substances in the same coatings, and a body may repeat its layers:
 * each wave and each coating is computed once. A value depends on what it is asked for alone, so sharing changes no bit.
 */

/** Most nodes of a lattice. */
export const MOST_NODES = 256;

/** Substances of two full stacks. */
const MOST_WAVES = 2 * MOST_INTERFACES;

export const squares = new Float64Array(MOST_NODES);
/** 2 d kappa, wave by wave, node by node within. */
export const kappas = new Float64Array(MOST_WAVES * MOST_NODES);
/** e^-x and 1 - e^-x, coating by coating. */
export const keeps = new Float64Array(MOST_WAVES * MOST_NODES);
export const loses = new Float64Array(MOST_WAVES * MOST_NODES);

const waveChi = new Float64Array(MOST_WAVES);
const waveMu = new Float64Array(MOST_WAVES);
const coatWave = new Int32Array(MOST_WAVES);
const coatThickness = new Float64Array(MOST_WAVES);
let waveCount = 0;
let coatCount = 0;
let nodes: LogLattice | null = null;
/** y0 and X of the frequency; in an array, because a double in a variable that changes is allocated anew. */
const frequency = new Float64Array([Number.NaN, Number.NaN]);

/**
 * Waves from here on belong to this frequency; those of the one before are forgotten unless it is the same.
 *
 * @throws RangeError where a lattice has more nodes than there is room for
 */
export function startWaves(lattice: LogLattice, y0: number, X: number): void {
	const room = waveCount + MOST_INTERFACES < MOST_WAVES && coatCount + MOST_INTERFACES < MOST_WAVES;
	if (lattice === nodes && y0 === frequency[0] && X === frequency[1] && room) return;
	const { count, s } = lattice;
	if (count > MOST_NODES)
		throw new RangeError(`a lattice of ${count} nodes; there is room for ${MOST_NODES}`);
	nodes = lattice;
	frequency[0] = y0;
	frequency[1] = X;
	waveCount = 0;
	coatCount = 0;
	for (let i = 0; i < count; i++) squares[i] = s[i] * (2 * y0 + s[i]);
}

/** Where the kappas of a substance begin. */
export function waveAt(chi: number, mu: number): number {
	for (let w = 0; w < waveCount; w++) if (waveChi[w] === chi && waveMu[w] === mu) return w * MOST_NODES;
	const count = nodes?.count ?? 0;
	const at = waveCount * MOST_NODES;
	const index = (1 + chi) * mu * frequency[1];
	for (let i = 0; i < count; i++) kappas[at + i] = Math.sqrt(squares[i] + index);
	waveChi[waveCount] = chi;
	waveMu[waveCount] = mu;
	waveCount++;
	return at;
}

/** Where the fadings of a layer begin: of the wave at `wave`, t/d thick. */
export function coatAt(wave: number, thickness: number): number {
	for (let c = 0; c < coatCount; c++)
		if (coatWave[c] === wave && coatThickness[c] === thickness) return c * MOST_NODES;
	const count = nodes?.count ?? 0;
	const at = coatCount * MOST_NODES;
	for (let i = 0; i < count; i++) fading(kappas[wave + i] * thickness, keeps, loses, at + i);
	coatWave[coatCount] = wave;
	coatThickness[coatCount] = thickness;
	coatCount++;
	return at;
}

/** 2 d kappa at the first node, where it is smallest. */
export const firstKappa = (wave: number): number => kappas[wave];
