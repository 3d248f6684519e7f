import { logLattice, type LogLattice } from '../numerics/log-lattice.ts';
import { OPAQUE } from '../reflection/stack.ts';
import { roundTripTime, type Body, type System } from '../system.ts';
import {
	bodyAtFrequency,
	bodyResponse,
	respondAtFrequency,
	respondAtZero,
	type BodyAtFrequency,
	type BodyResponse
} from './body-response.ts';
import {
	dressedBodyResponse,
	respondDressedAtFrequency,
	respondDressedAtZero,
	respondPlasmaAtZero,
	type DressAtFrequency,
	type DressedBodyResponse
} from './dressed-body-response.ts';
import { dressedResponse, type DressedResponse } from './dressed-response.ts';
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
 * then
 * the medium; behind it, for bodies that have them, to the permittivity along the normal and to the logarithm of the sheet's
 * conductivity, place by place.
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
	/** TE at n = 0 and its derivatives to ln(wp^2) of each place; null where no carriers without damping take part. */
	plasmaAtZero(): FrequencyResponse | null;
	/** Where in a row of derivatives those of a body stand that only a dressed one has. */
	slots: [left: Slots, right: Slots];
}

/** First index of a body's places in a row of derivatives; `normal` and `sheet` for dressed bodies. */
export interface Slots {
	own: number;
	normal: number | null;
	sheet: number | null;
}

/** A body with room for what it is at a frequency, and for its response. */
interface Answering {
	body: Body;
	at: BodyAtFrequency;
	plain: BodyResponse;
	dressed: { at: DressAtFrequency; response: DressedBodyResponse } | null;
}

function answering(body: Body, separation: number): Answering {
	const at = bodyAtFrequency(body);
	body.thickness.forEach((t, j) => (at.thickness[j + 1] = t / separation));
	const { dress, places } = body;
	const dressed = dress && {
		at: {
			normal: new Float64Array(places.length + 1),
			sheet: new Float64Array(places.length + 1),
			uniaxial: (j: number) => j > 0 && dress.normals[j - 1] !== places[j - 1]
		},
		response: dressedBodyResponse()
	};
	return { body, at, plain: bodyResponse(), dressed };
}

function slotsOf([left, right]: readonly Body[]): { slots: [Slots, Slots]; medium: number; count: number } {
	const medium = left.places.length + right.places.length;
	let count = medium + 1;
	const slot = ({ places, dress }: Body, own: number): Slots => {
		if (dress === null) return { own, normal: null, sheet: null };
		const normal = count;
		count += 2 * places.length;
		return { own, normal, sheet: normal + places.length };
	};
	const slots: [Slots, Slots] = [slot(left, 0), slot(right, left.places.length)];
	return { slots, medium, count };
}

/**
 * @param system      half-spaces and stacks, local; axes along the normal and sheets as in dress.ts
 * @param separation  m
 */
export function frequencyResponse(system: System, separation: number): Responder {
	const { left, right, substances } = system;
	const time = roundTripTime(separation);
	const layout = slotsOf([left, right]);
	const bodies = [left, right].map((body) => answering(body, separation));
	const lattices: (LogLattice | undefined)[] = [];

	const fill = ({ body, at, dressed }: Answering, xi: number): void => {
		[0, ...body.places].forEach((place, j) => {
			at.chi[j] = substances[place].chi?.atXi(xi) ?? 0;
			at.mu[j] = substances[place].mu.atXi(xi);
		});
		if (dressed === null || body.dress === null) return;
		const { normals, sheets } = body.dress;
		dressed.at.normal[0] = at.chi[0];
		normals.forEach((place, j) => {
			dressed.at.normal[j + 1] = substances[place].chi?.atXi(xi) ?? 0;
			dressed.at.sheet[j + 1] = sheets[j]?.(xi) ?? 0;
		});
	};

	/** TM and TE of a body at xi > 0 and one wave number. */
	const respondTo = ({ at, plain, dressed }: Answering, K: number, X: number): BodyResponse => {
		if (dressed === null) {
			respondAtFrequency(plain, at, K, X);
			return plain;
		}
		respondDressedAtFrequency(dressed.response, at, dressed.at, K, X);
		return dressed.response;
	};

	/** As in the sums themselves (lifshitz/frequency-terms.ts): nothing singular within this radius of s = 0. */
	const radius = (X: number, y0: number): number => {
		let smallest = Math.min(1, y0);
		for (const { body, at, dressed } of bodies) {
			for (let j = 0; j < at.chi.length; j++) {
				if (body.ideal && j === at.chi.length - 1) continue;
				const index = (1 + at.chi[j]) * at.mu[j] * X;
				smallest = Math.min(smallest, index / (2 * y0));
				const ratio = j > 0 && j < at.chi.length - 1 ? 1 / at.thickness[j] : Infinity;
				const root = Math.sqrt(index);
				if (root < OPAQUE * ratio && ratio < Infinity)
					smallest = Math.min(smallest, (ratio * root) / y0, ratio);
				if (dressed === null || !dressed.at.uniaxial(j)) continue;
				// TM fields of a uniaxial place fall like sqrt(eps_p/eps_z) sqrt(K + eps_z X).
				const along = (1 + dressed.at.normal[j]) * at.mu[j] * X;
				smallest = Math.min(smallest, along / (2 * y0));
				const stretched = (ratio * Math.sqrt(along)) / root;
				if (root < OPAQUE * ratio && ratio < Infinity)
					smallest = Math.min(smallest, (stretched * Math.sqrt(along)) / y0, stretched);
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
		const sum = newSums(layout);
		const decay0 = Math.exp(-y0);
		for (let i = 0; i < lattice.count; i++) {
			const s = lattice.s[i];
			const K = s * (2 * y0 + s);
			const y = y0 + s;
			const [one, other] = [respondTo(first, K, X), respondTo(second, K, X)];
			// At a fixed wave number the decay in the gap follows the medium.
			const deeper = (first.at.mu[0] * X) / (2 * y);
			for (const polarisation of ['tm', 'te'] as const)
				addNode(
					sum,
					i & 1,
					lattice.weight[i],
					y,
					decay0 * lattice.decay[i],
					one[polarisation],
					other[polarisation],
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
		const sum = newSums(layout);
		for (let i = 0; i < lattice.count && system.ions !== 'off'; i++) {
			const s = lattice.s[i];
			const y = y0 + s;
			const k = Math.sqrt(s * (2 * y0 + s));
			const screened = system.screening !== null;
			const [one, other] = bodies.map(({ body, at: held, plain, dressed }): Response => {
				if (dressed === null) {
					respondAtZero(plain.tm, body.zero, held.thickness, y, k, screened);
					return plain.tm;
				}
				const { tm } = dressed.response;
				respondDressedAtZero(tm, body.zero, held.thickness, dressed.at.uniaxial, y, k, screened);
				return tm;
			});
			addNode(sum, i & 1, lattice.weight[i], y, Math.exp(-y), one, other, 0);
		}
		return finished(sum);
	};

	const plasmaAtZero = (): FrequencyResponse | null => {
		const materials = [...left.zero, ...right.zero];
		if (left.zero[0].square > 0 || !materials.some(({ square, ideal }) => square > 0 && !ideal)) return null;
		const lattice = logLattice(STEP, NO_DISC, CUT, Math.sqrt(CUT) / 200);
		const plain = ({ own }: Slots): Slots => ({ own, normal: null, sheet: null });
		const [ofLeft, ofRight] = layout.slots;
		const sum = newSums({
			slots: [plain(ofLeft), plain(ofRight)],
			medium: layout.medium,
			count: layout.medium + 1
		});
		const [one, other] = [dressedResponse(), dressedResponse()];
		const X = time ** 2;
		for (let i = 0; i < lattice.count; i++) {
			const y = lattice.s[i];
			[one, other].forEach((response, side) => {
				const { body, at: held } = bodies[side];
				respondPlasmaAtZero(response, body.zero, held.thickness, y, X);
			});
			addNode(sum, i & 1, lattice.weight[i], y, Math.exp(-y), one, other, 0);
		}
		return finished(sum);
	};
	return { at, atZero, plasmaAtZero, slots: layout.slots };
}

/** A body's response; what only dressed ones have is left out for the others. */
type Response = StackResponse & Partial<Pick<DressedResponse, 'byNormal' | 'bySheet'>>;

/** Sums over even and odd nodes apart: their difference measures the rule. */
interface Sums {
	slots: [left: Slots, right: Slots];
	/** Index of the medium. */
	medium: number;
	value: [Float64Array, Float64Array];
	by: [freeEnergy: Float64Array, pressure: Float64Array][];
	magnitude: Float64Array;
}

const newSums = ({
	slots,
	medium,
	count
}: Omit<Sums, 'value' | 'by' | 'magnitude'> & { count: number }): Sums => ({
	slots,
	medium,
	value: [new Float64Array(2), new Float64Array(2)],
	by: [0, 1].map(() => [new Float64Array(count), new Float64Array(count)]),
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
	first: Response,
	second: Response,
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
	[first, second].forEach((one: Response, side) => {
		const facing = side === 0 ? second.reflection : first.reflection;
		const { own, normal, sheet } = sum.slots[side];
		for (let j = 1; j <= one.last; j++) {
			add(own + j - 1, facing * one.derivative[j], 0);
			if (normal === null || sheet === null) continue;
			add(normal + j - 1, facing * (one.byNormal?.[j] ?? 0), 0);
			add(sheet + j - 1, facing * (one.bySheet?.[j] ?? 0), 0);
		}
	});
	const both = second.reflection * first.derivative[0] + first.reflection * second.derivative[0];
	add(sum.medium, both, deeper);
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
