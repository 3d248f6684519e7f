import type { PermittivityModel } from '../contract.ts';
import { radPerSFromEv } from '../units.ts';
import { kramersKronig } from './kramers-kronig.ts';
import { principalValue } from './principal-value.ts';
import { segmentAt, segmentsOf, type Segment } from './segments.ts';
import { addLimits, NO_STATIC_LIMIT, type ComplexValue, type Susceptibility } from './susceptibility.ts';
import { highEnd, lowEnd, type TableEnd } from './table-ends.ts';

export type TableModel = Extract<PermittivityModel, { kind: 'table' }>;

/** Shares of eps(i xi) - 1; they add up to one (all zero where eps = 1). */
export interface EpsilonShares {
	below: number;
	inside: number;
	above: number;
}

/** Octaves of a power law beyond an end of the table that the real axis still feels at 1e-12. */
const END_OCTAVES = 40;

interface Parts {
	low: TableEnd;
	inside: (xi: number) => number;
	high: TableEnd;
	segments: Segment[];
	first: number;
	last: number;
}

function partsOf(model: TableModel): Parts {
	const omegas = model.energiesEv.map(radPerSFromEv);
	const segments = segmentsOf(omegas, model.epsilon2);
	const last = omegas.length - 1;
	return {
		low: lowEnd(model.lowEnd, omegas[0], model.epsilon2[0]),
		inside: kramersKronig(segments),
		high: highEnd(model.highEnd, omegas[last], model.epsilon2[last]),
		segments,
		first: omegas[0],
		last: omegas[last]
	};
}

/**
 * A measured eps''(omega), interpolated and continued by its ends, through Kramers-Kronig (methods.md section 7,
 * "Tables"). Relative rounding error about 1e-14; the interpolation itself is part of the data, not of the error.
 */
export function table(model: TableModel): Susceptibility {
	const parts = partsOf(model);
	const { low, inside, high } = parts;
	return {
		atXi: (xi) => low.atXi(xi) + inside(xi) + high.atXi(xi),
		atOmega: realAxis(model, parts),
		atZero: addLimits([low.atZero, { ...NO_STATIC_LIMIT, finite: inside(0) }, high.atZero]),
		knots: [],
		ulps: 48
	};
}

/** eps(i xi) - 1 by where it comes from; at xi = 0 what stays finite. */
export interface TableShares {
	below(xi: number): number;
	inside(xi: number): number;
	above(xi: number): number;
	atZero: EpsilonShares;
}

/** The three parts of a table's eps(i xi) - 1 as functions, prepared once. */
export function tableShares(model: TableModel): TableShares {
	const { low, inside, high } = partsOf(model);
	return {
		below: low.atXi,
		inside,
		above: high.atXi,
		atZero: { below: low.atZero.finite, inside: inside(0), above: high.atZero.finite }
	};
}

/** How much of eps(i xi) - 1 comes from below, inside and above the table; prepared once for all xi. */
export function epsilonSharesOf(model: TableModel): (xi: number) => EpsilonShares {
	const { low, inside, high } = partsOf(model);
	return (xi) => {
		const shares = { below: low.atXi(xi), inside: inside(xi), above: high.atXi(xi) };
		const total = shares.below + shares.inside + shares.above;
		if (total === 0) return shares;
		return { below: shares.below / total, inside: shares.inside / total, above: shares.above / total };
	};
}

/** The same at one xi. */
export const epsilonShares = (model: TableModel, xi: number): EpsilonShares => epsilonSharesOf(model)(xi);

/** Power laws of the ends, cut into octaves, as segments of the real axis. */
function endSegments(model: TableModel, { first, last }: Parts): Segment[] {
	const segments: Segment[] = [];
	const octaves = Array.from({ length: END_OCTAVES }, (_, k) => k);
	if (model.lowEnd.kind === 'power' && model.epsilon2[0] > 0) {
		const growth = model.lowEnd.exponent;
		for (const k of octaves) {
			const from = first * 2 ** -(k + 1);
			segments.push({
				from,
				to: first * 2 ** -k,
				kind: 'power',
				start: model.epsilon2[0] * 2 ** (-growth * (k + 1)),
				growth
			});
		}
	}
	const lastEpsilon2 = model.epsilon2[model.epsilon2.length - 1];
	if (model.highEnd.kind === 'power' && lastEpsilon2 > 0) {
		const growth = -model.highEnd.exponent;
		for (const k of octaves) {
			const from = last * 2 ** k;
			segments.push({
				from,
				to: last * 2 ** (k + 1),
				kind: 'power',
				start: lastEpsilon2 * 2 ** (growth * k),
				growth
			});
		}
	}
	return segments;
}

/** eps' - 1 of free carriers whose eps'' counts only up to w1; closed form by partial fractions. */
function carriersReal(model: TableModel, w1: number, omega: number): number {
	if (model.lowEnd.kind !== 'drude' && model.lowEnd.kind !== 'plasma') return 0;
	const wp2 = radPerSFromEv(model.lowEnd.plasmaEnergyEv) ** 2;
	const gamma = model.lowEnd.kind === 'drude' ? radPerSFromEv(model.lowEnd.dampingEv) : 0;
	if (gamma === 0) return -wp2 / (omega * omega);
	const distance = Math.max(Math.abs(w1 - omega), 1e-9 * w1);
	const logarithm = Math.log(distance / (w1 + omega)) / (2 * omega);
	return (
		(((2 / Math.PI) * wp2 * gamma) / (omega * omega + gamma * gamma)) *
		(logarithm - Math.atan(w1 / gamma) / gamma)
	);
}

function realAxis(model: TableModel, parts: Parts): (omega: number) => ComplexValue {
	const { segments, first, last, low, high } = parts;
	// Few who prepare a table ask for the real axis: its panels are made when the first one does.
	let onReal: ((omega: number) => number) | undefined;
	return (omega) => {
		const inside = segments.find(({ from, to }) => omega >= from && omega <= to);
		let im = inside ? segmentAt(inside, omega) : 0;
		if (omega < first) im = low.epsIm(omega);
		if (omega > last) im = high.epsIm(omega);
		onReal ??= principalValue([...segments, ...endSegments(model, parts)]);
		return { re: onReal(omega) + carriersReal(model, first, omega), im };
	};
}
