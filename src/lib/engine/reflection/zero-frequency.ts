import type { ZeroFrequencyRule } from '../contract.ts';
import type { LogLattice } from '../numerics/log-lattice.ts';
import { fading } from '../numerics/fading.ts';
import type { StaticLimit } from '../permittivity/susceptibility.ts';
import { interfaces, MOST_INTERFACES, reflectionFromBack } from './recursion.ts';

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
	/** TM fields of a uniaxial dielectric fall this much faster than like k; 1 where it is left out. */
	stretch?: number;
	/** A conducting sheet lies in front. */
	sheet?: boolean;
}

/**
 * The zero-frequency rule of one material: the limit of the model as written, or what is stated instead. `drude` drops
 * the TE reflection, `plasma` the dampings, `ideal` makes an ideal conductor; `dcCounted` makes a dielectric conduct (how well
 * does not matter: against matter that does not conduct TM reflects wholly), `dcIgnored` keeps a conducting model from it.
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
	if (rule === 'dcCounted') return { order: 1, amplitude: 1, square: 0, mu, ideal: false };
	if (rule === 'dcIgnored') return { order: 0, amplitude: finite, square: 0, mu, ideal: false };
	if (rule === 'drude')
		return { order: 1, amplitude: slope > 0 ? slope : square, square: 0, mu, ideal: false };
	if (square > 0) return { order: 2, amplitude: square, square, mu, ideal: false };
	if (slope > 0) return { order: 1, amplitude: slope, square: 0, mu, ideal: false };
	return { order: 0, amplitude: finite, square: 0, mu, ideal: false };
}

/** r_TM at n = 0 between two materials in which both fields decay alike (no carriers without damping on both sides). */
export function staticTm(a: ZeroFrequencyMaterial, b: ZeroFrequencyMaterial): number {
	if (b.ideal || b.sheet || b.order > a.order) return 1;
	if (b.order < a.order) return -1;
	const offset = a.order === 0 ? 2 : 0;
	return (b.amplitude - a.amplitude) / (b.amplitude + a.amplitude + offset);
}

/** r_TE at n = 0 where no undamped carriers take part. */
export function staticTe(a: ZeroFrequencyMaterial, b: ZeroFrequencyMaterial): number {
	if (b.ideal) return -1;
	return (b.mu - a.mu) / (b.mu + a.mu);
}

const kappas = new Float64Array(MOST_INTERFACES);
const kept = new Float64Array(MOST_INTERFACES);
const lost = new Float64Array(MOST_INTERFACES);
const all = interfaces();

/** r, 1 + r and 1 - r of interface b from the two admittances: r = (onward - back)/(onward + back). */
function setQuotients(b: number, difference: number, onward: number, back: number): void {
	const sum = onward + back;
	all.r[b] = difference / sum;
	all.plus[b] = (2 * onward) / sum;
	all.minus[b] = (2 * back) / sum;
}

function setTotal(b: number, r: number): void {
	all.r[b] = r;
	all.plus[b] = 1 + r;
	all.minus[b] = 1 - r;
}

/** TM at interface b; K = (2 d k)^2, X = (2 d/c)^2. */
function setTm(
	b: number,
	left: ZeroFrequencyMaterial,
	right: ZeroFrequencyMaterial,
	K: number,
	X: number
): void {
	if (right.ideal || right.sheet || right.order > left.order) return setTotal(b, 1);
	if (right.order < left.order) return setTotal(b, -1);
	const d = right.amplitude - left.amplitude;
	if (left.order < 2) {
		const one = left.order === 0 ? 1 : 0;
		return setQuotients(b, d, one + right.amplitude, one + left.amplitude);
	}
	const onward = right.amplitude * kappas[b - 1];
	const back = left.amplitude * kappas[b];
	const crossed = d * left.mu - left.amplitude * (right.mu - left.mu);
	const product = d * (left.amplitude + right.amplitude) * K + left.amplitude * right.amplitude * X * crossed;
	setQuotients(b, product / (onward + back), onward, back);
}

/** TE at interface b. */
function setTe(
	b: number,
	left: ZeroFrequencyMaterial,
	right: ZeroFrequencyMaterial,
	K: number,
	X: number
): void {
	if (right.ideal) return setTotal(b, -1);
	const d = right.mu - left.mu;
	const onward = right.mu * kappas[b - 1];
	const back = left.mu * kappas[b];
	const crossed = d * left.square - left.mu * (right.square - left.square);
	const product = d * (left.mu + right.mu) * K + left.mu * right.mu * X * crossed;
	setQuotients(b, product / (onward + back), onward, back);
}

/** First TM interface where the medium holds mobile ions: (eps k - eps_m s)/(eps k + eps_m s). */
function setScreened(medium: ZeroFrequencyMaterial, wall: ZeroFrequencyMaterial, k: number, s: number): void {
	if (wall.ideal || wall.sheet || wall.order > 0) return setTotal(1, 1);
	const onward = (1 + wall.amplitude) * k;
	const back = (1 + medium.amplitude) * s;
	setQuotients(1, onward - back, onward, back);
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
	const end = materials.findIndex(({ ideal }) => ideal);
	const last = end < 0 ? materials.length - 1 : end;
	for (let i = 0; i < lattice.count; i++) {
		const s = lattice.s[i];
		const K = s * (2 * y0 + s);
		kappas[0] = y0 + s;
		for (let b = 1; b <= last; b++) {
			kappas[b] = Math.sqrt(K + materials[b].square * materials[b].mu * X);
			const stretch = polarisation === 'tm' ? (materials[b].stretch ?? 1) : 1;
			if (b < last) fading(kappas[b] * stretch * thickness[b], kept, lost, b);
			if (polarisation === 'te') setTe(b, materials[b - 1], materials[b], K, X);
			else setTm(b, materials[b - 1], materials[b], K, X);
		}
		if (screened) setScreened(materials[0], materials[1], Math.sqrt(K), kappas[0]);
		r[i] = reflectionFromBack(all, last, kept, lost);
	}
}
