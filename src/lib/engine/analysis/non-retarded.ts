import { BOLTZMANN, REDUCED_PLANCK } from '../constants.ts';
import type { NonRetardedLimit } from '../contract.ts';
import { intervalBlock, matsubaraBlock, type FrequencyBlock } from '../lifshitz/frequency-blocks.ts';
import { matsubaraFrequency } from '../lifshitz/matsubara.ts';
import { trilogarithm } from '../numerics/trilogarithm.ts';
import { staticTe, staticTm } from '../reflection/zero-frequency.ts';
import type { Body, Substance, System } from '../system.ts';

/** Terms summed one by one before octaves are summed by Gauss rules; a power of two. */
const DIRECT = 32;

/** Two rules for each octave: their difference is the error of the coarser one, far above that of the finer. */
const FINE = 16;
const COARSE = 10;

/** Terms fall in the end like xi^-4, or xi^-2 where a relaxation does; a sum that has not begun to fall by then has no limit. */
const MOST_OCTAVES = 44;
const SLOWEST_FALL = 0.6;
const TAIL_SHARE = 1e-13;

/** Sums in units of one mode: value, sum of magnitudes, error of the rules, of rounding, and what follows. */
interface Sum {
	value: number;
	rules: number;
	rounding: number;
	tail: number;
}

const UNIT_ROUNDOFF = 2 ** -53;
/** |x Li_3'(x)/Li_3(x)| on [-1, 1] is at most zeta(2)/zeta(3). */
const CONDITION = 1.4;

/**
 * Non-retarded Hamaker coefficient of two half-spaces (methods.md section 8; Lifshitz 1956, Parsegian 2006), in J:
 *
 *     A = (3/2) kB T sum'_n [Li_3(Delta_1 Delta_2) + Li_3 of the same with permeabilities],
 *     Delta_j = (eps_j - eps_m)/(eps_j + eps_m);   at T = 0 kB T sum' becomes hbar/(2 pi) int d xi
 *
 * so that F = -A/(12 pi d^2) as d goes to zero. Ions do not screen in this limit.
 *
 * @returns the coefficient with a relative bound on its error, or the reason why there is none: layered bodies have a
 *          coefficient that depends on d, and permittivities that never fall to one make the sum diverge
 */
export function nonRetardedLimit(system: System): NonRetardedLimit {
	const { left, right, substances, temperature } = system;
	if (left.places.length > 1 || right.places.length > 1)
		return { why: 'Layers make it depend on the separation: see the effective coefficients of the points.' };
	if (left.ideal || right.ideal)
		return { why: 'An ideal conductor reflects at every frequency: the sum over frequencies diverges.' };
	if ([left, right].some(({ dress }) => dress?.sheets.some((sheet) => sheet !== null)))
		return { why: 'A conducting sheet makes it depend on the separation: see the effective coefficients.' };
	const bodies: [Substance, Substance] = [bodyAlone(left, substances), bodyAlone(right, substances)];
	const term = (xi: number): { value: number; rounding: number } => termAt(substances[0], bodies, xi);
	const sum = temperature > 0 ? matsubara(term, system) : integral(term, system);
	if (sum === null)
		return { why: 'A permittivity that never falls to one makes the sum over frequencies diverge.' };
	const perMode = temperature > 0 ? BOLTZMANN * temperature : REDUCED_PLANCK / (2 * Math.PI);
	const error = sum.rules + sum.tail + sum.rounding;
	const value = 1.5 * perMode * sum.value;
	if (error === 0) return { hamakerJ: { value: value + 0, errorBound: 0 } };
	return {
		hamakerJ: {
			value,
			errorBound: Math.min(Number.MAX_VALUE, error / Math.abs(sum.value) + 8 * UNIT_ROUNDOFF)
		}
	};
}

/** A uniaxial half-space reflects like sqrt(eps_p eps_z) without retardation (methods.md section 4). */
function bodyAlone({ places, dress }: Body, substances: readonly Substance[]): Substance {
	const own = substances[places[0]];
	if (dress === null || own.chi === null) return own;
	const [plane, along] = [own.chi, substances[dress.normals[0]].chi ?? own.chi];
	return {
		...own,
		chi: {
			...plane,
			ulps: plane.ulps + along.ulps + 4,
			atXi: (xi) => {
				const [p, z] = [plane.atXi(xi), along.atXi(xi)];
				return (p + z + p * z) / (1 + Math.sqrt((1 + p) * (1 + z)));
			}
		}
	};
}

function termAt(
	medium: Substance,
	[left, right]: readonly [Substance, Substance],
	xi: number
): { value: number; rounding: number } {
	const chiM = medium.chi?.atXi(xi) ?? 0;
	const muM = medium.mu.atXi(xi);
	const of = ({ chi, mu }: Substance): { tm: number; te: number; noise: number } => {
		const own = chi?.atXi(xi) ?? 0;
		const ulps = (chi?.ulps ?? 0) * own + (medium.chi?.ulps ?? 0) * chiM;
		return {
			tm: (own - chiM) / (2 + own + chiM),
			te: (mu.atXi(xi) - muM) / (mu.atXi(xi) + muM),
			noise: own === chiM ? 0 : ulps / Math.abs(own - chiM) + 4
		};
	};
	const [a, b] = [of(left), of(right)];
	const tm = trilogarithm(a.tm * b.tm);
	const te = trilogarithm(a.te * b.te);
	const rounding = CONDITION * UNIT_ROUNDOFF * (Math.abs(tm) * (a.noise + b.noise + 8) + Math.abs(te) * 16);
	return { value: tm + te, rounding };
}

type Term = (xi: number) => { value: number; rounding: number };

/** A block by the finer rule; the difference of the two goes to the error. */
function addBlock(sum: Sum, term: Term, fine: FrequencyBlock, coarse: FrequencyBlock): number {
	let crude = 0;
	for (let i = 0; i < coarse.xi.length; i++) crude += coarse.weight[i] * term(coarse.xi[i]).value;
	let value = 0;
	let size = 0;
	for (let i = 0; i < fine.xi.length; i++) {
		const at = term(fine.xi[i]);
		value += fine.weight[i] * at.value;
		size += fine.weight[i] * Math.abs(at.value);
		sum.rounding += fine.weight[i] * at.rounding;
	}
	sum.value += value;
	if (!fine.exact) sum.rules += Math.abs(value - crude);
	return size;
}

/** Octaves upwards until what follows cannot count; null where the terms do not fall. */
function octaves(sum: Sum, size: (octave: number) => number): boolean {
	let before = Infinity;
	for (let octave = 0; octave < MOST_OCTAVES; octave++) {
		const now = size(octave);
		const fall = now === 0 ? 0 : now / before;
		before = now;
		if (octave < 2 || fall > SLOWEST_FALL) continue;
		sum.tail = (2 * now * fall) / (1 - fall);
		if (sum.tail <= TAIL_SHARE * Math.max(Math.abs(sum.value), sum.rounding)) return true;
	}
	return sum.value === 0 && sum.rounding === 0;
}

function matsubara(term: Term, { left, right, temperature, knots, ions }: System): Sum | null {
	const sum: Sum = { value: 0, rules: 0, rounding: 0, tail: 0 };
	if (ions !== 'off') {
		const tm = trilogarithm(staticTm(left.zero[0], left.zero[1]) * staticTm(right.zero[0], right.zero[1]));
		const te = trilogarithm(staticTe(left.zero[0], left.zero[1]) * staticTe(right.zero[0], right.zero[1]));
		sum.value = (tm + te) / 2;
		sum.rounding = 64 * UNIT_ROUNDOFF * (Math.abs(tm) + Math.abs(te));
	}
	for (let n = 1; n < DIRECT; n++) {
		const { value, rounding } = term(matsubaraFrequency(n, temperature));
		sum.value += value;
		sum.rounding += rounding;
	}
	const first = matsubaraFrequency(1, temperature);
	const done = octaves(sum, (octave) => {
		const from = DIRECT * 2 ** octave;
		const inside = knots.map((xi) => Math.ceil(xi / first)).filter((n) => n > from && n < 2 * from);
		const edges = [from, ...new Set(inside), 2 * from];
		return edges.slice(1).reduce((size, to, i) => {
			const block = (nodes: number): FrequencyBlock => matsubaraBlock(edges[i], to, nodes, temperature);
			return size + addBlock(sum, term, block(FINE), block(COARSE));
		}, 0);
	});
	return done ? sum : null;
}

/** Octaves of xi around this one, rad/s: below it the integrand is as good as constant or is followed further down. */
const MIDDLE = 2 ** 50;
const OCTAVES_BELOW = 56;

function integral(term: Term, { knots }: System): Sum | null {
	const sum: Sum = { value: 0, rules: 0, rounding: 0, tail: 0 };
	const add = (from: number, to: number): number => {
		const edges = [from, ...knots.filter((xi) => xi > from && xi < to), to];
		return edges
			.slice(1)
			.reduce(
				(size, end, i) =>
					size +
					addBlock(sum, term, intervalBlock(edges[i], end, FINE), intervalBlock(edges[i], end, COARSE)),
				0
			);
	};
	let lowest = 0;
	for (let k = 1; k <= OCTAVES_BELOW; k++) lowest = add(MIDDLE * 2 ** -k, MIDDLE * 2 ** (1 - k));
	// |Li_3| grows by no more than zeta(3)/|Li_3| towards zero frequency: the rest is bounded by the largest it can be.
	sum.tail = 0;
	const below = MIDDLE * 2 ** -OCTAVES_BELOW * 1.2020569031595942 * (lowest === 0 ? 0 : 1);
	const done = octaves(sum, (octave) => add(MIDDLE * 2 ** octave, MIDDLE * 2 ** (octave + 1)));
	sum.tail += below;
	return done ? sum : null;
}
