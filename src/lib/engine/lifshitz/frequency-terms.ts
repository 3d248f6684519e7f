import type { LogLattice } from '../numerics/log-lattice.ts';
import { dressedReflection, dressedStack, type DressedStack } from '../reflection/dressed-stack.ts';
import { halfSpaceReflection, idealReflection } from '../reflection/half-space.ts';
import { stackAtFrequency, stackReflection, OPAQUE, type StackAtFrequency } from '../reflection/stack.ts';
import type { Dress } from '../dress.ts';
import type { Body, System } from '../system.ts';
import type { FrequencyBlock } from './frequency-blocks.ts';
import { frequencyLattices } from './lattices.ts';
import {
	doubledFall,
	LATTICE_CONSTANTS,
	LEFT_OUT,
	PAIRED_CONSTANTS,
	singleFall,
	type Level
} from './level.ts';
import { addPolarizationNoise, sumOf, type Quantities } from './polarization-sum.ts';
import { UNIT_ROUNDOFF } from './tally.ts';

/** Integrals of one frequency: TE and TM of F, P, G, what the lattice leaves open and what rounding may do. */
export interface FrequencyTerms {
	te: Float64Array;
	tm: Float64Array;
	lattice: Float64Array;
	rounding: Float64Array;
	/** y0 of the frequency. */
	phase: number;
	evaluations: number;
}

/** Share of the nearest singularity that the doubly exponential foot of the lattice may fill. */
const FOOT = 0.5;
/** Of discs smaller than 2^-60 nothing is asked. */
export const SMALLEST_SCALE = 60;

/** Roundoff of one frequency term beside that of permittivities: sums, roots, exponentials of y. */
const ROUNDING = 16;

/** Roundoff of y0 itself: frequency, travel time, their product and the root. */
const PHASE_ROUNDING = 8;

/** Of one interface with a sheet, or between uniaxial media. */
const DRESSED_ULPS = 12;

interface BodyNoise {
	/** Relative error of the coefficient of a half-space. */
	relative: number;
	/** Absolute error of the coefficient of a stack. */
	absolute: number;
}

export interface FrequencyEvaluator {
	terms: FrequencyTerms;
	/** Computes node i of a block into `terms`; time is 2 d/c, `grade` says how finely (level.ts). */
	at(block: FrequencyBlock, i: number, separation: number, time: number, grade: number): void;
	/** y0 of node i. */
	phaseOf(block: FrequencyBlock, i: number, time: number): number;
}

/** Evaluator of frequency terms for one system and level. */
export function frequencyTerms(system: System, level: Level, quantities: Quantities): FrequencyEvaluator {
	const { substances, left, right, twins } = system;
	const graded = level.steps.map((step) => frequencyLattices(step, level.cut));
	const paired = frequencyLattices(level.paired, level.cut);
	const size = graded[0].at(SMALLEST_SCALE, 0).count + 4;
	const polarizationSum = sumOf(quantities);
	const [tm1, te1, tm2, te2] = [0, 1, 2, 3].map(() => new Float64Array(size));
	const stacks = [left, right].map(({ thickness }) => stackAtFrequency(thickness.length));
	const layered = [left, right].filter(({ thickness }) => thickness.length > 0);
	const dressed: DressedStack[] = [];
	const sums = new Float64Array(6);
	const noise: BodyNoise = { relative: 0, absolute: 0 };
	const noise2: BodyNoise = { relative: 0, absolute: 0 };
	const terms: FrequencyTerms = {
		te: new Float64Array(3),
		tm: new Float64Array(3),
		lattice: new Float64Array(3),
		rounding: new Float64Array(3),
		phase: 0,
		evaluations: 0
	};
	const { te, tm, lattice: open, rounding } = terms;
	const [firstTe, firstTm, firstOpen] = [0, 1, 2].map(() => new Float64Array(3));
	const singles = level.steps.map(singleFall);
	const doubled = doubledFall(level.paired);
	const mediumUlps = substances[0].chi?.ulps ?? 0;
	// e^-y0 turns the relative error of y0, half of it from that of eps_m, into y0 times as much.
	const phaseUlps = PHASE_ROUNDING + mediumUlps / 2;

	/** Permittivities of a block, computed when first asked for. */
	const fill = (block: FrequencyBlock): void => {
		for (const { chi, mu } of substances) {
			block.chi.push(chi === null ? new Float64Array(block.xi.length) : block.xi.map((xi) => chi.atXi(xi)));
			block.mu.push(mu.one ? new Float64Array(block.xi.length).fill(1) : block.xi.map((xi) => mu.atXi(xi)));
		}
	};

	/** Radius of the disc around s = 0 in which nothing singular lies (log-lattice.ts). */
	const analyticRadius = (
		block: FrequencyBlock,
		i: number,
		separation: number,
		X: number,
		y0: number
	): number => {
		let lowest = Infinity;
		for (let j = 0; j < substances.length; j++) {
			const square = (1 + block.chi[j][i]) * block.mu[j][i];
			if (square < lowest && substances[j].chi !== null) lowest = square;
		}
		let radius = Math.min(1, y0, (lowest * X) / (2 * y0));
		for (let b = 0; b < layered.length; b++) {
			const { thickness, places, dress } = layered[b];
			for (let j = 0; j < thickness.length; j++) {
				const index = Math.sqrt((1 + block.chi[places[j]][i]) * block.mu[places[j]][i] * X);
				const ratio = separation / thickness[j];
				if (index < OPAQUE * ratio) radius = Math.min(radius, (ratio * index) / y0, ratio);
				if (dress === null || dress.normals[j] === places[j]) continue;
				// TM fields of a uniaxial layer fall like sqrt(eps_p/eps_z) sqrt(K + eps_z X).
				const along = (1 + block.chi[dress.normals[j]][i]) * block.mu[places[j]][i] * X;
				const stretched = (ratio * Math.sqrt(along)) / index;
				if (index < OPAQUE * ratio) radius = Math.min(radius, (stretched * Math.sqrt(along)) / y0, stretched);
			}
		}
		return radius;
	};

	const reflectDressed = (
		body: Body,
		{ normals, sheets }: Dress,
		block: FrequencyBlock,
		i: number,
		separation: number,
		lattice: LogLattice,
		y0: number,
		X: number,
		rTM: Float64Array,
		rTE: Float64Array,
		left: BodyNoise
	): void => {
		const stack: DressedStack = (dressed[body.thickness.length] ??= dressedStack(body.thickness.length));
		stack.ideal = body.ideal;
		stack.chi[0] = block.chi[0][i];
		stack.normal[0] = stack.chi[0];
		stack.mu[0] = block.mu[0][i];
		let ulps = 0;
		for (let j = 0; j < body.places.length; j++) {
			const place = body.places[j];
			stack.chi[j + 1] = block.chi[place][i];
			stack.normal[j + 1] = block.chi[normals[j]][i];
			stack.mu[j + 1] = block.mu[place][i];
			stack.sheet[j + 1] = sheets[j]?.(block.xi[i]) ?? 0;
			if (j < body.thickness.length) stack.thickness[j + 1] = body.thickness[j] / separation;
			ulps += DRESSED_ULPS + (substances[place].chi?.ulps ?? 0) + (substances[normals[j]].chi?.ulps ?? 0);
		}
		left.absolute = UNIT_ROUNDOFF * (ulps + mediumUlps * body.places.length);
		dressedReflection(lattice, y0, X, stack, rTM, rTE);
	};

	const reflect = (
		body: Body,
		stack: StackAtFrequency,
		block: FrequencyBlock,
		i: number,
		separation: number,
		lattice: LogLattice,
		y0: number,
		X: number,
		rTM: Float64Array,
		rTE: Float64Array,
		left: BodyNoise
	): void => {
		const chiM = block.chi[0][i];
		left.relative = 0;
		left.absolute = 0;
		if (body.dress !== null)
			return reflectDressed(body, body.dress, block, i, separation, lattice, y0, X, rTM, rTE, left);
		if (body.places.length === 1) {
			if (body.ideal) return idealReflection(lattice.count, rTM, rTE);
			const place = body.places[0];
			const chi = block.chi[place][i];
			const mu = block.mu[place][i];
			halfSpaceReflection(lattice, y0, X, chiM, chi, block.mu[0][i], mu, rTM, rTE);
			const ulps = substances[place].chi?.ulps ?? 0;
			if (chi !== chiM) left.relative = (ulps * chi + mediumUlps * chiM) / Math.abs(chi - chiM);
			return;
		}
		stack.ideal = body.ideal;
		stack.chi[0] = chiM;
		stack.mu[0] = block.mu[0][i];
		let interfaces = 0;
		for (let j = 0; j < body.places.length; j++) {
			const place = body.places[j];
			stack.chi[j + 1] = block.chi[place][i];
			stack.mu[j + 1] = block.mu[place][i];
			if (j < body.thickness.length) stack.thickness[j + 1] = body.thickness[j] / separation;
			const a = stack.chi[j];
			const b = stack.chi[j + 1];
			// Equal media meet without an interface: nothing is reflected there, exactly.
			if (a === b && stack.mu[j] === stack.mu[j + 1]) continue;
			interfaces += 4 + (((substances[place].chi?.ulps ?? 0) + mediumUlps) * (a + b)) / (2 + a + b);
		}
		left.absolute = UNIT_ROUNDOFF * interfaces;
		stackReflection(lattice, y0, X, stack, rTM, rTE);
	};

	/** TE and TM on one lattice added to the terms; `sums` of even and odd nodes decide what the lattice leaves open. */
	const onLattice = (
		block: FrequencyBlock,
		i: number,
		separation: number,
		lattice: LogLattice,
		y0: number,
		X: number
	): void => {
		reflect(left, stacks[0], block, i, separation, lattice, y0, X, tm1, te1, noise);
		let tmRight = tm1;
		let teRight = te1;
		let noiseRight = noise;
		if (!twins) {
			reflect(right, stacks[1], block, i, separation, lattice, y0, X, tm2, te2, noise2);
			tmRight = tm2;
			teRight = te2;
			noiseRight = noise2;
		}
		terms.evaluations += 2 * lattice.count;
		const relative = UNIT_ROUNDOFF * (ROUNDING + phaseUlps * y0 + 2 * (noise.relative + noiseRight.relative));
		const silentLeft = left.silent / separation;
		const silentRight = right.silent / separation;
		// Three assignments cost less than a call.
		rounding[0] = 0;
		rounding[1] = 0;
		rounding[2] = 0;
		if (noise.absolute > 0 || noiseRight.absolute > 0) {
			addPolarizationNoise(
				lattice,
				y0,
				te1,
				teRight,
				noise.absolute,
				noiseRight.absolute,
				silentLeft,
				silentRight,
				rounding
			);
			addPolarizationNoise(
				lattice,
				y0,
				tm1,
				tmRight,
				noise.absolute,
				noiseRight.absolute,
				silentLeft,
				silentRight,
				rounding
			);
		}
		polarizationSum(lattice, y0, te1, teRight, sums);
		for (let q = 0; q < 3; q++) {
			te[q] = sums[2 * q] + sums[2 * q + 1];
			open[q] = Math.abs(sums[2 * q] - sums[2 * q + 1]);
		}
		polarizationSum(lattice, y0, tm1, tmRight, sums);
		for (let q = 0; q < 3; q++) {
			tm[q] = sums[2 * q] + sums[2 * q + 1];
			open[q] += Math.abs(sums[2 * q] - sums[2 * q + 1]);
			rounding[q] += relative * (Math.abs(te[q]) + Math.abs(tm[q]));
		}
	};

	const phaseOf = (block: FrequencyBlock, i: number, time: number): number => {
		if (block.chi.length === 0) fill(block);
		return block.xi[i] * time * Math.sqrt((1 + block.chi[0][i]) * block.mu[0][i]);
	};

	const at = (block: FrequencyBlock, i: number, separation: number, time: number, grade: number): void => {
		const y0 = phaseOf(block, i, time);
		const X = (block.xi[i] * time) ** 2;
		terms.phase = y0;
		const radius = FOOT * analyticRadius(block, i, separation, X, y0);
		const scale = Math.min(SMALLEST_SCALE, Math.max(0, Math.ceil(-Math.log2(radius))));
		const odd = (block.parity + i) & 1;
		const lattices = block.doubled ? paired : graded[grade];
		onLattice(block, i, separation, lattices.at(scale, odd), y0, X);
		if (!block.doubled) {
			for (let q = 0; q < 3; q++) {
				open[q] *= singles[grade] * LATTICE_CONSTANTS[q];
				open[q] += LEFT_OUT * level.cut * (Math.abs(te[q]) + Math.abs(tm[q]));
			}
			return;
		}
		for (let q = 0; q < 3; q++) {
			firstTe[q] = te[q];
			firstTm[q] = tm[q];
			firstOpen[q] = open[q];
		}
		onLattice(block, i, separation, lattices.at(scale, 1 - odd), y0, X);
		for (let q = 0; q < 3; q++) {
			te[q] = (te[q] + firstTe[q]) / 2;
			tm[q] = (tm[q] + firstTm[q]) / 2;
			open[q] = doubled * PAIRED_CONSTANTS[q] * Math.hypot(open[q], firstOpen[q]);
			open[q] += LEFT_OUT * level.cut * (Math.abs(te[q]) + Math.abs(tm[q]));
		}
	};
	return { terms, at, phaseOf };
}
