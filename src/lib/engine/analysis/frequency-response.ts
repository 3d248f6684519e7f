import { logLattice, type LogLattice } from '../numerics/log-lattice.ts';
import { OPAQUE } from '../reflection/stack.ts';
import { roundTripTime, type Body, type System } from '../system.ts';
import {
	bodyAtFrequency,
	bodyResponse,
	respondAtFrequency,
	respondAtZero,
	type BodyAtFrequency
} from './body-response.ts';
import type { StackResponse } from './stack-response.ts';

/** The lattice of the finest level of the sums themselves. */
const STEP = 0.25;
const CUT = 1e-17;
const FOOT = 0.5;
const SMALLEST_SCALE = 60;
const NO_DISC = 1e-30;

/** Error of one lattice over the difference of its halves, exp(-pi^2/(2h)), with the constant of its worst integrand. */
const LATTICE_FALL = 50 * Math.exp(-(Math.PI ** 2) / (2 * STEP));
/** Roundings of one integrand, relative to the sum of magnitudes. */
const ROUNDING = 256 * 2 ** -53;

/**
 * Integrals over wave number at one frequency, in the reduced units of methods.md section 1 (free energy and pressure, TE and
 * TM together), and their derivatives to the permittivity of each place: left body from the gap outwards, then the right one,
 * last the medium.
 */
export interface FrequencyResponse {
	freeEnergy: number;
	pressure: number;
	freeEnergyBy: Float64Array;
	pressureBy: Float64Array;
	/** What the lattice and rounding may have changed, absolute: of the values, and of any derivative. */
	valueError: [freeEnergy: number, pressure: number];
	derivativeError: [freeEnergy: number, pressure: number];
}

export interface Responder {
	/** rad/s, > 0. */
	at(xi: number): FrequencyResponse;
	/** n = 0 with full weight; null where carriers of the medium are without damping: no permittivity to derive by. */
	atZero(): FrequencyResponse | null;
	places: number;
}

/**
 * @param system      half-spaces and stacks, local and isotropic
 * @param separation  m
 */
export function frequencyResponse(system: System, separation: number): Responder {
	const { left, right, substances } = system;
	const time = roundTripTime(separation);
	const places = left.places.length + right.places.length + 1;
	const bodies = [left, right].map((body) => {
		const at = bodyAtFrequency(body);
		body.thickness.forEach((t, j) => (at.thickness[j + 1] = t / separation));
		return { body, at, response: bodyResponse() };
	});
	const lattices: (LogLattice | undefined)[] = [];

	const fill = ({ body, at }: { body: Body; at: BodyAtFrequency }, xi: number): void => {
		[0, ...body.places].forEach((place, j) => {
			at.chi[j] = substances[place].chi?.atXi(xi) ?? 0;
			at.mu[j] = substances[place].mu.atXi(xi);
		});
	};

	/** As in the sums themselves (lifshitz/frequency-terms.ts): nothing singular within this radius of s = 0. */
	const radius = (X: number, y0: number): number => {
		let smallest = Math.min(1, y0);
		for (const { body, at } of bodies) {
			for (let j = 0; j < at.chi.length; j++) {
				if (body.ideal && j === at.chi.length - 1) continue;
				const index = (1 + at.chi[j]) * at.mu[j] * X;
				smallest = Math.min(smallest, index / (2 * y0));
				const ratio = j > 0 && j < at.chi.length - 1 ? 1 / at.thickness[j] : Infinity;
				const root = Math.sqrt(index);
				if (root < OPAQUE * ratio && ratio < Infinity)
					smallest = Math.min(smallest, (ratio * root) / y0, ratio);
			}
		}
		return smallest;
	};

	const at = (xi: number): FrequencyResponse => {
		for (const one of bodies) fill(one, xi);
		const [first, second] = bodies;
		const X = (xi * time) ** 2;
		const medium = (1 + first.at.chi[0]) * first.at.mu[0] * X;
		const y0 = Math.sqrt(medium);
		const scale = Math.min(SMALLEST_SCALE, Math.max(0, Math.ceil(-Math.log2(FOOT * radius(X, y0)))));
		const lattice = (lattices[scale] ??= logLattice(STEP, 2 ** -scale, CUT));
		const sum = newSums(places, left.places.length);
		const decay0 = Math.exp(-y0);
		for (let i = 0; i < lattice.count; i++) {
			const s = lattice.s[i];
			const K = s * (2 * y0 + s);
			const y = y0 + s;
			respondAtFrequency(first.response, first.at, K, X);
			respondAtFrequency(second.response, second.at, K, X);
			// At a fixed wave number the decay in the gap follows the medium.
			const deeper = (first.at.mu[0] * X) / (2 * y);
			for (const polarisation of ['tm', 'te'] as const)
				addNode(
					sum,
					i & 1,
					lattice.weight[i],
					y,
					decay0 * lattice.decay[i],
					first.response[polarisation],
					second.response[polarisation],
					deeper
				);
		}
		return finished(sum);
	};

	const atZero = (): FrequencyResponse | null => {
		const mediumAtZero = left.zero[0];
		if (mediumAtZero.square > 0) return null;
		const y0 = system.screening === null ? 0 : 2 * separation * system.screening;
		const floor = y0 === 0 ? Math.sqrt(CUT) / 200 : CUT * 1e-4 * Math.min(1, y0);
		const lattice = logLattice(STEP, NO_DISC, CUT, floor);
		const sum = newSums(places, left.places.length);
		const [first, second] = bodies;
		for (let i = 0; i < lattice.count && system.ions !== 'off'; i++) {
			const s = lattice.s[i];
			const y = y0 + s;
			const k = Math.sqrt(s * (2 * y0 + s));
			for (const { body, at: held, response } of bodies)
				respondAtZero(response.tm, body.zero, held.thickness, y, k, system.screening !== null);
			addNode(sum, i & 1, lattice.weight[i], y, Math.exp(-y), first.response.tm, second.response.tm, 0);
		}
		return finished(sum);
	};
	return { at, atZero, places };
}

/** Sums over even and odd nodes apart: their difference measures the rule. */
interface Sums {
	/** Index of the right body's first place. */
	behindLeft: number;
	value: [Float64Array, Float64Array];
	by: [freeEnergy: Float64Array, pressure: Float64Array][];
	magnitude: Float64Array;
}

const newSums = (places: number, behindLeft: number): Sums => ({
	behindLeft,
	value: [new Float64Array(2), new Float64Array(2)],
	by: [0, 1].map(() => [new Float64Array(places), new Float64Array(places)]),
	magnitude: new Float64Array(2)
});

/**
 * One node of one polarisation, dK/2 = y ds: with z = R e^-y and dz = e^-y (dR - R dy)
 *
 *     F: ln(1 - z), dF = -dz/(1 - z);   P: y z/(1 - z), dP = dy z/(1 - z) + y dz/(1 - z)^2
 */
function addNode(
	sum: Sums,
	parity: number,
	weight: number,
	y: number,
	decay: number,
	first: StackResponse,
	second: StackResponse,
	deeper: number
): void {
	const R = first.reflection * second.reflection;
	const z = R * decay;
	// At the foot of the n = 0 lattice 1 - z may round to nothing; its weight there is far below what counts.
	const d = 1 / Math.max(1 - z, y * 1e-3);
	const w = weight * y;
	sum.value[parity][0] += w * Math.log1p(-Math.min(z, 1 - y * 1e-3));
	sum.value[parity][1] += w * y * z * d;
	const [freeEnergy, pressure] = sum.by[parity];
	const add = (place: number, dR: number, dy: number): void => {
		const dz = decay * (dR - R * dy);
		const f = -w * dz * d;
		const p = w * (dy * z * d + y * dz * d * d);
		freeEnergy[place] += f;
		pressure[place] += p;
		sum.magnitude[0] += Math.abs(f);
		sum.magnitude[1] += Math.abs(p);
	};
	for (let j = 1; j <= first.last; j++) add(j - 1, second.reflection * first.derivative[j], 0);
	for (let j = 1; j <= second.last; j++)
		add(sum.behindLeft + j - 1, first.reflection * second.derivative[j], 0);
	const both = second.reflection * first.derivative[0] + first.reflection * second.derivative[0];
	add(freeEnergy.length - 1, both, deeper);
}

function finished({ value, by, magnitude }: Sums): FrequencyResponse {
	const [even, odd] = by;
	const total = (q: 0 | 1): Float64Array => even[q].map((one, place) => one + odd[q][place]);
	const open = (q: 0 | 1): number =>
		even[q].reduce((worst, one, place) => Math.max(worst, Math.abs(one - odd[q][place])), 0);
	const error = (difference: number, size: number): number => LATTICE_FALL * difference + ROUNDING * size;
	const values = [0, 1].map((q) => value[0][q] + value[1][q]);
	const valueError = (q: 0 | 1): number => error(Math.abs(value[0][q] - value[1][q]), Math.abs(values[q]));
	const derivativeError = (q: 0 | 1): number => error(open(q), magnitude[q]);
	return {
		freeEnergy: values[0],
		pressure: values[1],
		freeEnergyBy: total(0),
		pressureBy: total(1),
		valueError: [valueError(0), valueError(1)],
		derivativeError: [derivativeError(0), derivativeError(1)]
	};
}
