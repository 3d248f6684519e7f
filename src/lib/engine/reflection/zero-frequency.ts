import type { ZeroFrequencyRule } from '../contract.ts';
import type { LogLattice } from '../numerics/log-lattice.ts';
import type { StaticLimit } from '../permittivity/susceptibility.ts';
import { throughLayer } from './stack.ts';

/**
 * A material at n = 0 (methods.md section 2). eps grows like amplitude/xi^order as xi falls; `square` is what is left of
 * eps xi^2 for the TE waves.
 */
export interface ZeroFrequencyMaterial {
	order: 0 | 1 | 2;
	/** eps(0) - 1 at order 0; else the coefficient of xi^-order, rad/s or (rad/s)^2. */
	amplitude: number;
	/** (rad/s)^2. */
	square: number;
	mu: number;
	ideal: boolean;
}

/**
 * The zero-frequency rule of one material: the limit of the model as written, or what is stated instead. `drude` drops
 * the TE reflection, `plasma` the dampings, `ideal` makes an ideal conductor.
 */
export function zeroFrequencyMaterial(
	limit: StaticLimit,
	mu: number,
	rule: ZeroFrequencyRule | undefined
): ZeroFrequencyMaterial {
	const { finite, slope, square, plasmaSquared } = limit;
	if (rule === 'ideal') return { order: 0, amplitude: 0, square: 0, mu: 1, ideal: true };
	if (rule === 'plasma')
		return { order: 2, amplitude: plasmaSquared, square: plasmaSquared, mu, ideal: false };
	if (rule === 'drude')
		return { order: 1, amplitude: slope > 0 ? slope : square, square: 0, mu, ideal: false };
	if (square > 0) return { order: 2, amplitude: square, square, mu, ideal: false };
	if (slope > 0) return { order: 1, amplitude: slope, square: 0, mu, ideal: false };
	return { order: 0, amplitude: finite, square: 0, mu, ideal: false };
}

/** r_TM at n = 0 between two materials in which both fields decay alike (no carriers without damping on both sides). */
export function staticTm(a: ZeroFrequencyMaterial, b: ZeroFrequencyMaterial): number {
	if (b.ideal || b.order > a.order) return 1;
	if (b.order < a.order) return -1;
	const offset = a.order === 0 ? 2 : 0;
	return (b.amplitude - a.amplitude) / (b.amplitude + a.amplitude + offset);
}

/** r_TE at n = 0 where no undamped carriers take part. */
export function staticTe(a: ZeroFrequencyMaterial, b: ZeroFrequencyMaterial): number {
	if (b.ideal) return -1;
	return (b.mu - a.mu) / (b.mu + a.mu);
}

const kappas = new Float64Array(64);

/** r_TM of one interface; K = (2 d k)^2, X = (2 d/c)^2. */
function interfaceTm(
	a: ZeroFrequencyMaterial,
	b: ZeroFrequencyMaterial,
	K: number,
	X: number,
	kA: number,
	kB: number
): number {
	if (a.order !== 2 || b.order !== 2 || b.ideal) return staticTm(a, b);
	const d = b.amplitude - a.amplitude;
	const den = b.amplitude * kA + a.amplitude * kB;
	const crossed = d * a.mu - a.amplitude * (b.mu - a.mu);
	return (d * (a.amplitude + b.amplitude) * K + a.amplitude * b.amplitude * X * crossed) / (den * den);
}

/** r_TE of one interface. */
function interfaceTe(
	a: ZeroFrequencyMaterial,
	b: ZeroFrequencyMaterial,
	K: number,
	X: number,
	kA: number,
	kB: number
): number {
	if (b.ideal) return -1;
	const d = b.mu - a.mu;
	const den = b.mu * kA + a.mu * kB;
	if (den === 0) return 0;
	return (
		(d * (a.mu + b.mu) * K + a.mu * b.mu * X * (d * a.square - a.mu * (b.square - a.square))) / (den * den)
	);
}

/**
 * Reflection of a stack at n = 0 over y = y0 + s. Fields of TM and TE decay in material j with
 * kappa_j = sqrt(K + square_j mu_j X). `screened`: the medium holds mobile ions, y is 2 d sqrt(k^2 + kappa_D^2) and the
 * first TM interface is (eps k - eps_m s)/(eps k + eps_m s) (Mitchell and Richmond 1974).
 *
 * @param materials  medium, layers, substrate
 * @param thickness  t/d of each layer, index 1..layers
 * @param r          overwritten, one value a node
 */
export function zeroFrequencyReflection(
	polarisation: 'te' | 'tm',
	lattice: LogLattice,
	y0: number,
	X: number,
	materials: readonly ZeroFrequencyMaterial[],
	thickness: Float64Array,
	screened: boolean,
	r: Float64Array
): void {
	const last = materials.length - 1;
	const single = polarisation === 'te' ? interfaceTe : interfaceTm;
	for (let i = 0; i < lattice.count; i++) {
		const s = lattice.s[i];
		const K = s * (2 * y0 + s);
		kappas[0] = y0 + s;
		for (let j = 1; j <= last; j++) kappas[j] = Math.sqrt(K + materials[j].square * materials[j].mu * X);
		let rho = 0;
		for (let b = last; b >= 1; b--) {
			let front = single(materials[b - 1], materials[b], K, X, kappas[b - 1], kappas[b]);
			if (b === 1 && screened) front = screenedTm(materials[0], materials[1], Math.sqrt(K), kappas[0]);
			rho = b === last || materials[b].ideal ? front : throughLayer(front, rho, kappas[b] * thickness[b]);
		}
		r[i] = rho;
	}
}

function screenedTm(
	medium: ZeroFrequencyMaterial,
	wall: ZeroFrequencyMaterial,
	k: number,
	s: number
): number {
	if (wall.ideal || wall.order > 0) return 1;
	const wallSide = (1 + wall.amplitude) * k;
	const mediumSide = (1 + medium.amplitude) * s;
	return (wallSide - mediumSide) / (wallSide + mediumSide);
}
