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
import {
	bandSusceptibility,
	mixtureCarriers,
	mixtureSusceptibility,
	sellmeierSusceptibility,
	slowAtTemperature,
	spreadSusceptibility
} from './slow-lifshitz-composed.ts';
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
type Term = Exclude<
	PermittivityModel,
	{ kind: 'sum' } | { kind: 'vacuum' } | { kind: 'idealConductor' } | { kind: 'temperatureDependent' }
>;

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
	if (model.kind === 'brendelBormann')
		return model.terms.map((term) => ({ kind: 'brendelBormann', terms: [term] }));
	if (model.kind === 'temperatureDependent') return termsOf(model.of);
	return [model];
}

type Mixture = Extract<Term, { kind: 'maxwellGarnett' | 'bruggeman' }>;

/** Amplitudes of 1/xi^2 and 1/xi of a mixture, and of 1/xi^2 with dampings dropped; any unit, since only zero matters of the second. */
function mixtureZero(mixture: Mixture): { undamped: number; conducting: number; dropped: number } {
	const [host, inclusion] = [mixture.host, mixture.inclusion].map((part) => carriersOf(termsOf(part)));
	const of = (name: 'undamped' | 'conducting' | 'dropped') =>
		mixtureCarriers(mixture, host[name], inclusion[name]);
	return { undamped: of('undamped'), conducting: of('conducting'), dropped: of('dropped') };
}

function carriersOf(terms: readonly Term[]): { undamped: number; conducting: number; dropped: number } {
	const sum = { undamped: 0, conducting: 0, dropped: 0 };
	for (const term of terms) {
		if (term.kind === 'maxwellGarnett' || term.kind === 'bruggeman') {
			const inner = mixtureZero(term);
			sum.undamped += inner.undamped;
			sum.conducting += inner.conducting;
			sum.dropped += inner.dropped;
			continue;
		}
		const low = term.kind === 'table' ? term.lowEnd : term;
		if (low.kind === 'plasma' || low.kind === 'drude') sum.dropped += low.plasmaEnergyEv ** 2;
		if (low.kind === 'plasma') sum.undamped += low.plasmaEnergyEv ** 2;
		if (low.kind === 'plasma' || low.kind === 'drude' || low.kind === 'dcConductivity') sum.conducting += 1;
	}
	return sum;
}

function zeroResponse(terms: readonly Term[], rule: ZeroFrequencyRule | undefined): ZeroResponse {
	const { undamped, conducting, dropped } = carriersOf(terms);
	const conducts = conducting > 0;
	if (rule === 'plasma') return { conducts, mirror: false, plasmaEnergySquared: dropped };
	if (rule === 'drude') return { conducts, mirror: false, plasmaEnergySquared: 0 };
	return { conducts, mirror: rule === 'ideal', plasmaEnergySquared: undamped };
}

export function slowMaterial(material: MaterialModel, kelvin: number): SlowMaterial {
	const terms = termsOf(slowAtTemperature(material.permittivity, kelvin));
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
		case 'brendelBormann':
			return dd(spreadSusceptibility(term.terms[0], toNumber(w)));
		case 'taucLorentz':
		case 'codyLorentz':
			return term.terms.reduce((sum, _, i) => add(sum, dd(bandSusceptibility(term, i, toNumber(w)))), dd(0));
		case 'sellmeier':
			return dd(sellmeierSusceptibility(term, xi.radPerS));
		case 'maxwellGarnett':
		case 'bruggeman':
			return mixtureSusceptibility(term, phase(term.host, xi), phase(term.inclusion, xi));
	}
}

/** A phase of a mixture; at xi = 0 one that conducts is as good as without limit. */
function phase(model: PermittivityModel, xi: ImaginaryFrequency): DoubleDouble {
	const terms = termsOf(model);
	if (xi.radPerS === 0 && carriersOf(terms).conducting > 0) return toDoubleDouble(1e40);
	return terms.reduce((sum, term) => add(sum, susceptibility(term, xi)), toDoubleDouble(0));
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

const inDoubles = (material: SlowMaterial, i: number) => !IN_32_DIGITS.has(material.terms[i].kind);

/** The others are computed in doubles: their relative error, a few roundings of positive sums. */
const IN_32_DIGITS = new Set<Term['kind']>([
	'constant',
	'drude',
	'plasma',
	'lorentz',
	'debye',
	'ninhamParsegian',
	'dcConductivity'
]);
const TABLE_ERROR = 1.5e-15;

/** Sums of ten thousand terms, and lines fitted through points. */
const FITTED_ERROR = 2e-14;

const errorOf = (material: SlowMaterial, i: number): number =>
	material.terms[i].kind === 'table' || material.terms[i].kind === 'imaginaryTable'
		? TABLE_ERROR
		: FITTED_ERROR;

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
		if (inDoubles(one, i)) error += Math.abs(value[0]) * errorOf(one, i);
	}
	for (let i = 0; i < other.terms.length; i++) {
		if (unmatched[i].name === '') continue;
		const value = cached(other, i, xi, cache);
		sum = add(sum, negate(value));
		if (inDoubles(other, i)) error += Math.abs(value[0]) * errorOf(other, i);
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
