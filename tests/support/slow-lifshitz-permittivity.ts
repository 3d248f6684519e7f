import type {
	MaterialModel,
	PermeabilityModel,
	PermittivityModel,
	ZeroFrequencyRule
} from '$lib/engine/contract.ts';
import {
	add,
	divide,
	multiply,
	negate,
	toDoubleDouble,
	toNumber,
	type DoubleDouble
} from './slow-lifshitz-double-double.ts';
import { imaginaryTableSusceptibility } from './slow-lifshitz-imaginary-table.ts';
import { tableSusceptibility } from './slow-lifshitz-table.ts';

/** hbar/e in eV s, from the exact SI values h = 6.62607015e-34 J s, e = 1.602176634e-19 C. */
const HBAR_OVER_E: DoubleDouble = divide(divide([6.62607015, 0], multiply([1.602176634, 0], [1e15, 0])), [
	2 * Math.PI,
	2 * 1.2246467991473532e-16
]);

/** F/m, CODATA 2022. */
const EPSILON_VACUUM = 8.8541878188e-12;

/** Closed forms and tables, sums flattened; an ideal conductor has no susceptibility and is told apart. */
type Term = Exclude<PermittivityModel, { kind: 'sum' } | { kind: 'vacuum' } | { kind: 'idealConductor' }>;

export interface SlowMaterial {
	readonly terms: readonly Term[];
	/** One text per term, so that what two materials share can be struck out before anything is computed. */
	readonly names: readonly string[];
	readonly ideal: boolean;
	readonly permeability: PermeabilityModel;
	readonly zero: ZeroResponse;
}

/** The n = 0 response: of TM whether it screens, of TE the plasma term in eV^2 or an ideal mirror. */
export interface ZeroResponse {
	readonly conducts: boolean;
	readonly mirror: boolean;
	readonly plasmaEnergySquared: number;
}

/** A frequency shared by all materials of an arrangement. */
export interface ImaginaryFrequency {
	readonly radPerS: number;
	readonly ev: DoubleDouble;
}

export function imaginaryFrequency(radPerS: number): ImaginaryFrequency {
	return { radPerS, ev: multiply(toDoubleDouble(radPerS), HBAR_OVER_E) };
}

function termsOf(model: PermittivityModel): Term[] {
	if (model.kind === 'sum') return model.of.flatMap(termsOf);
	if (model.kind === 'vacuum' || model.kind === 'idealConductor') return [];
	if (model.kind === 'lorentz') return model.terms.map((term) => ({ kind: 'lorentz', terms: [term] }));
	if (model.kind === 'debye') return model.terms.map((term) => ({ kind: 'debye', terms: [term] }));
	if (model.kind === 'ninhamParsegian')
		return model.terms.map((term) => ({ kind: 'ninhamParsegian', terms: [term] }));
	return [model];
}

function zeroResponse(terms: readonly Term[], rule: ZeroFrequencyRule | undefined): ZeroResponse {
	let conducts = false;
	let undamped = 0;
	let damped = 0;
	for (const term of terms) {
		const low = term.kind === 'table' ? term.lowEnd : term;
		if (low.kind === 'plasma') undamped += low.plasmaEnergyEv ** 2;
		if (low.kind === 'drude') damped += low.plasmaEnergyEv ** 2;
		if (low.kind === 'plasma' || low.kind === 'drude' || low.kind === 'dcConductivity') conducts = true;
	}
	if (rule === 'plasma') return { conducts, mirror: false, plasmaEnergySquared: undamped + damped };
	if (rule === 'drude') return { conducts, mirror: false, plasmaEnergySquared: 0 };
	return { conducts, mirror: rule === 'ideal', plasmaEnergySquared: undamped };
}

export function slowMaterial(material: MaterialModel): SlowMaterial {
	const terms = termsOf(material.permittivity);
	const ideal = material.permittivity.kind === 'idealConductor';
	return {
		terms,
		names: terms.map((term) => JSON.stringify(term)),
		ideal,
		permeability: material.permeability ?? { kind: 'constant', value: 1 },
		zero: ideal
			? { conducts: true, mirror: true, plasmaEnergySquared: 0 }
			: zeroResponse(terms, material.zeroFrequency)
	};
}

const ONE = toDoubleDouble(1);
const square = (a: DoubleDouble) => multiply(a, a);

/** Susceptibility of one term at i xi; where xi = 0 the term must not conduct. */
function susceptibility(term: Term, xi: ImaginaryFrequency): DoubleDouble {
	const w = xi.ev;
	const dd = toDoubleDouble;
	switch (term.kind) {
		case 'constant':
			return add(dd(term.value), negate(ONE));
		case 'drude':
			return divide(square(dd(term.plasmaEnergyEv)), multiply(w, add(w, dd(term.dampingEv))));
		case 'plasma':
			return square(divide(dd(term.plasmaEnergyEv), w));
		case 'lorentz': {
			const { strengthEv2, energyEv, dampingEv } = term.terms[0];
			return divide(dd(strengthEv2), add(square(dd(energyEv)), multiply(w, add(w, dd(dampingEv)))));
		}
		case 'debye': {
			const { strength, relaxationTimePs } = term.terms[0];
			const phase = multiply(dd(xi.radPerS), divide(dd(relaxationTimePs), dd(1e12)));
			return divide(dd(strength), add(ONE, phase));
		}
		case 'ninhamParsegian': {
			const { strength, frequencyRadPerS } = term.terms[0];
			return divide(dd(strength), add(ONE, square(divide(dd(xi.radPerS), dd(frequencyRadPerS)))));
		}
		case 'dcConductivity':
			return divide(divide(dd(term.siemensPerM), dd(EPSILON_VACUUM)), dd(xi.radPerS));
		case 'table':
			return dd(tableSusceptibility(term.energiesEv, term.epsilon2, term.lowEnd, term.highEnd, toNumber(w)));
		case 'imaginaryTable':
			return dd(imaginaryTableSusceptibility(term.frequenciesRadPerS, term.epsilon, xi.radPerS));
	}
}

/** Values of the terms met so far at one frequency. */
export type TermCache = Map<string, DoubleDouble>;

function cached(material: SlowMaterial, i: number, xi: ImaginaryFrequency, cache: TermCache): DoubleDouble {
	const known = cache.get(material.names[i]);
	if (known) return known;
	const value = susceptibility(material.terms[i], xi);
	cache.set(material.names[i], value);
	return value;
}

const isTable = (material: SlowMaterial, i: number) =>
	material.terms[i].kind === 'table' || material.terms[i].kind === 'imaginaryTable';

/** Tables are computed in doubles: their relative error, a few roundings of positive sums. */
const TABLE_ERROR = 1.5e-15;

export interface Difference {
	readonly value: number;
	/** Absolute. */
	readonly error: number;
}

/** eps(i xi) - 1. */
export function electricSusceptibility(
	material: SlowMaterial,
	xi: ImaginaryFrequency,
	cache: TermCache
): number {
	let sum = toDoubleDouble(0);
	for (let i = 0; i < material.terms.length; i++) sum = add(sum, cached(material, i, xi, cache));
	return toNumber(sum);
}

/** eps of one material less eps of another, terms in common struck out, the rest subtracted in 32 digits. */
export function permittivityDifference(
	one: SlowMaterial,
	other: SlowMaterial,
	xi: ImaginaryFrequency,
	cache: TermCache
): Difference {
	const unmatched = other.names.map((name) => ({ name }));
	let sum = toDoubleDouble(0);
	let error = 0;
	for (let i = 0; i < one.terms.length; i++) {
		const twin = unmatched.findIndex((entry) => entry.name === one.names[i]);
		if (twin >= 0) {
			unmatched[twin].name = '';
			continue;
		}
		const value = cached(one, i, xi, cache);
		sum = add(sum, value);
		if (isTable(one, i)) error += Math.abs(value[0]) * TABLE_ERROR;
	}
	for (let i = 0; i < other.terms.length; i++) {
		if (unmatched[i].name === '') continue;
		const value = cached(other, i, xi, cache);
		sum = add(sum, negate(value));
		if (isTable(other, i)) error += Math.abs(value[0]) * TABLE_ERROR;
	}
	const value = toNumber(sum);
	return { value, error: error + Math.abs(value) * 2e-16 };
}

/** mu - 1 at i xi. */
export function magneticSusceptibility(model: PermeabilityModel, radPerS: number): number {
	if (model.kind === 'constant') return model.value - 1;
	if (model.kind === 'staticOnly') return radPerS === 0 ? model.value - 1 : 0;
	return (model.value - 1) / (1 + radPerS * (model.relaxationTimePs / 1e12));
}
