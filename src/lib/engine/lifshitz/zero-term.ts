import { SPEED_OF_LIGHT } from '../constants.ts';
import type { LogLattice } from '../numerics/log-lattice.ts';
import { trilogarithm } from '../numerics/trilogarithm.ts';
import {
	staticTe,
	staticTm,
	zeroFrequencyReflection,
	type ZeroFrequencyMaterial
} from '../reflection/zero-frequency.ts';
import type { Body, System } from '../system.ts';
import { zeroLattice } from './lattices.ts';
import { doubledFall, LEFT_OUT, PAIRED_CONSTANTS, type Level } from './level.ts';
import { addPolarizationNoise, sumOf, type Quantities } from './polarization-sum.ts';
import { UNIT_ROUNDOFF, type Tally } from './tally.ts';

/** Reflection that does not depend on the wave number has a closed form: F -Li_3, P 2 Li_3, G 6 Li_3 of R. */
const CLOSED = [-1, 2, 6];

/** Share of the axis that a screened n = 0 term may live on. */
const SMALL_PART = 1e-4;

/** Rounding of the closed and of the numerical n = 0 term, in units of roundoff. */
const ROUNDING = 24;

/** The n = 0 term of a system (methods.md section 2), with the half weight of the primed sum. */
export function zeroTerm(
	system: System,
	level: Level,
	quantities: Quantities
): (separation: number, tally: Tally) => void {
	const polarizationSum = sumOf(quantities);
	const wanted = quantities === 'all' ? [0, 1, 2] : [1];
	const { left, right, screening, ions } = system;
	const medium = left.zero[0];
	const latticesTo = (floor: number): LogLattice[] =>
		[0, 1].map((odd) => zeroLattice(level.paired, level.cut, floor, odd));
	// With y0 = 0 the integrands vanish at least like y ln y at the foot.
	const unscreened = latticesTo(Math.sqrt(level.cut) / 200);
	const fall = doubledFall(level.paired);
	let rLeft = new Float64Array(0);
	let rRight = new Float64Array(0);
	const sums = new Float64Array(6);
	const open = new Float64Array(3);
	const noise = new Float64Array(3);
	const bare = left.zero.length === 2 && right.zero.length === 2;
	const carriers = [left, right].some(({ zero }) => zero.some(({ square }) => square > 0));
	const silent =
		!carriers && [...left.zero, ...right.zero].every(({ mu, ideal }) => mu === medium.mu && !ideal);

	const numeric = (polarisation: 'te' | 'tm', separation: number, tally: Tally): void => {
		const X = (2 * separation) / SPEED_OF_LIGHT;
		const screened = polarisation === 'tm' && screening !== null;
		const y0 = screened ? 2 * separation * screening : X * Math.sqrt(medium.square * medium.mu);
		open.fill(0);
		noise.fill(0);
		// With y0 > 0 they need not vanish, and may live on a small part of the axis.
		const lattices = y0 === 0 ? unscreened : latticesTo(level.cut * SMALL_PART * Math.min(1, y0));
		for (const lattice of lattices) {
			if (rLeft.length < lattice.count) {
				rLeft = new Float64Array(lattice.count);
				rRight = new Float64Array(lattice.count);
			}
			const reflect = (body: Body, r: Float64Array): void =>
				zeroFrequencyReflection(
					polarisation,
					lattice,
					y0,
					X * X,
					body.zero,
					reduced(body, separation),
					screened,
					r
				);
			reflect(left, rLeft);
			reflect(right, rRight);
			polarizationSum(lattice, y0, rLeft, rRight, sums);
			tally.evaluations += lattice.count;
			const [noiseLeft, noiseRight] = [noiseOf(rLeft, lattice.count), noiseOf(rRight, lattice.count)];
			addPolarizationNoise(
				lattice,
				y0,
				rLeft,
				rRight,
				noiseLeft,
				noiseRight,
				left.silent / separation,
				right.silent / separation,
				noise
			);
			for (const q of wanted) {
				const even = sums[2 * q];
				const odd = sums[2 * q + 1];
				// Half weight of the primed sum, and half of each of the two lattices.
				add(tally, polarisation, q, (even + odd) / 4, UNIT_ROUNDOFF * (ROUNDING + 8 * y0));
				open[q] = Math.hypot(open[q], even - odd);
				tally.lattice[q] += LEFT_OUT * level.cut * Math.abs(even + odd);
			}
		}
		for (const q of wanted) {
			tally.lattice[q] += (fall * PAIRED_CONSTANTS[q] * open[q]) / 2;
			tally.rounding[q] += noise[q] / 4;
		}
	};

	const closed = (polarisation: 'te' | 'tm', tally: Tally): void => {
		const single = polarisation === 'te' ? staticTe : staticTm;
		const R = single(medium, left.zero[1]) * single(medium, right.zero[1]);
		const amplified = closedRounding(medium, left.zero[1], right.zero[1], polarisation);
		for (const q of wanted)
			add(tally, polarisation, q, (CLOSED[q] * trilogarithm(R)) / 2, UNIT_ROUNDOFF * (ROUNDING + amplified));
	};

	return (separation, tally) => {
		if (ions === 'off') {
			// Screened away altogether: the electric term has no static part left.
		} else if (bare && !carriers && screening === null) closed('tm', tally);
		else numeric('tm', separation, tally);
		if (silent) return;
		if (bare && !carriers) closed('te', tally);
		else numeric('te', separation, tally);
	};
}

/** t/d, index 1..layers. */
const reduced = ({ thickness }: Body, separation: number): Float64Array =>
	Float64Array.from([0, ...thickness.map((t) => t / separation)]);

function add(
	tally: Tally,
	polarisation: 'te' | 'tm',
	q: number,
	value: number,
	relativeRounding: number
): void {
	tally.parts[4 * q + (polarisation === 'te' ? 0 : 1)] += value;
	tally.magnitude[q] += Math.abs(value);
	tally.rounding[q] += Math.abs(value) * relativeRounding;
}

/** Relative error of R from rounding of the static values, in units of roundoff. */
function closedRounding(
	medium: ZeroFrequencyMaterial,
	left: ZeroFrequencyMaterial,
	right: ZeroFrequencyMaterial,
	polarisation: 'te' | 'tm'
): number {
	const of = (body: ZeroFrequencyMaterial): number => {
		const [a, b] = polarisation === 'te' ? [medium.mu, body.mu] : [medium.amplitude, body.amplitude];
		const same = polarisation === 'te' || (body.order === medium.order && !body.ideal && !body.sheet);
		return same && a !== b ? (8 * (Math.abs(a) + Math.abs(b))) / Math.abs(b - a) : 0;
	};
	return of(left) + of(right);
}

/** Absolute roundoff of a coefficient; a body that equals the medium reflects nothing, exactly. */
function noiseOf(r: Float64Array, count: number): number {
	for (let i = 0; i < count; i++) if (r[i] !== 0) return 4 * UNIT_ROUNDOFF;
	return 0;
}
