import { SPEED_OF_LIGHT } from './constants.ts';
import type { BodyOf, ForceRequest, IonTreatment, MaterialModel } from './contract.ts';
import { susceptibility } from './permittivity/evaluator.ts';
import { NO_STATIC_LIMIT, type Susceptibility } from './permittivity/susceptibility.ts';
import { permeability, type Permeability } from './permeability.ts';
import { zeroFrequencyMaterial, type ZeroFrequencyMaterial } from './reflection/zero-frequency.ts';
import { dressedAtZero, isDressed, normalOf, sheetOf, type Dress } from './dress.ts';
import { debyeLength } from './ions.ts';
import { metresFromNm } from './units.ts';

/** A substance at n >= 1: what is shared by all places where it occurs. */
export interface Substance {
	/** Null for an ideal conductor. */
	chi: Susceptibility | null;
	mu: Permeability;
}

/** One body from the gap outwards, nothing behind an ideal conductor. */
export interface Body {
	/** Indices into `substances`: layers, then the substrate. */
	places: number[];
	/** m, one a layer. */
	thickness: number[];
	/** m; outer layers of the medium's own substance: they only put the body farther away. */
	silent: number;
	/** The last place is an ideal conductor. */
	ideal: boolean;
	/** Medium, layers, substrate at n = 0. */
	zero: ZeroFrequencyMaterial[];
	/** Null where every place is isotropic and without a sheet. */
	dress: Dress | null;
}

/** The arrangement in SI units, every substance once. Substance 0 is the medium. */
export interface System {
	substances: Substance[];
	left: Body;
	right: Body;
	/** Both bodies reflect alike at n >= 1. */
	twins: boolean;
	magnetic: boolean;
	/** K. */
	temperature: number;
	ions: IonTreatment;
	/** 1/m; null where no ions screen. */
	screening: number | null;
	/** rad/s, where some permittivity is not analytic. */
	knots: number[];
}

/** Gives the same object for the same substance. */
export type SubstanceSource = (material: MaterialModel) => Substance;

export const substanceOf = ({ permittivity, permeability: magnetic }: MaterialModel): Substance => ({
	chi: permittivity.kind === 'idealConductor' ? null : susceptibility(permittivity),
	mu: permeability(magnetic)
});

/** Substances by what their models say, whatever object says it. */
function substancesByModel(): SubstanceSource {
	const known = new Map<string, Substance>();
	return (material) => {
		const key = JSON.stringify([material.permittivity, material.permeability ?? null]);
		const substance = known.get(key) ?? substanceOf(material);
		known.set(key, substance);
		return substance;
	};
}

/**
 * `system` of a checked request: conversion of the contract to SI happens here and nowhere else.
 *
 * @param source  where substances come from that are prepared already
 */
export function systemOf(
	request: Pick<ForceRequest, 'arrangement'>,
	source: SubstanceSource = substancesByModel()
): System {
	const { arrangement } = request;
	const { medium, temperatureK } = arrangement;
	const substances: Substance[] = [];
	const indexOf = (material: MaterialModel): number => {
		const substance = source(material);
		const found = substances.indexOf(substance);
		return found < 0 ? substances.push(substance) - 1 : found;
	};
	const atZero = (material: MaterialModel): ZeroFrequencyMaterial => {
		const { chi, mu } = substances[indexOf(material)];
		const zero = zeroFrequencyMaterial(
			chi?.atZero ?? NO_STATIC_LIMIT,
			mu.atZero,
			chi === null ? 'ideal' : material.zeroFrequency
		);
		if (!isDressed(material)) return zero;
		const along = material.normal ? substances[indexOf(normalOf(material))].chi : null;
		return dressedAtZero(zero, along?.atZero ?? null, material.sheet !== undefined);
	};
	indexOf(medium);
	const ions = ionTreatment(arrangement);
	const screening = ions === 'screened' ? 1 / screeningLength(arrangement, substances[0]) : null;
	const mediumAtZero = ionsStated(arrangement) ? withoutCarriers(substances[0]) : atZero(medium);
	const bodyOf = ({ layers, substrate }: ForceRequest['arrangement']['left']): Body => {
		const materials = [...layers.map((layer) => layer.of), substrate];
		const end = materials.findIndex(({ permittivity }) => permittivity.kind === 'idealConductor');
		const seen = end < 0 ? materials : materials.slice(0, end + 1);
		const places = seen.map(indexOf);
		const thickness = layers.slice(0, seen.length - 1).map((layer) => metresFromNm(layer.thicknessNm));
		const firstOther = places.findIndex((place, j) => place !== 0 || isDressed(seen[j]));
		return {
			places,
			thickness,
			silent: thickness.slice(0, Math.max(0, firstOther)).reduce((sum, t) => sum + t, 0),
			ideal: end >= 0,
			zero: [mediumAtZero, ...seen.map(atZero)],
			dress: seen.some(isDressed)
				? {
						normals: seen.map((material) => indexOf(normalOf(material))),
						sheets: seen.map(({ sheet }) => sheetOf(sheet))
					}
				: null
		};
	};
	const left = bodyOf(arrangement.left);
	const right = bodyOf(arrangement.right);
	return {
		substances,
		left,
		right,
		twins: likeness(arrangement.left, left) === likeness(arrangement.right, right),
		magnetic: substances.some(({ mu }) => !mu.one),
		temperature: temperatureK,
		ions,
		screening,
		knots: [...new Set(substances.flatMap(({ chi }) => chi?.knots ?? []))].sort((a, b) => a - b)
	};
}

/** What a body reflects by at n >= 1. */
function likeness({ layers, substrate }: BodyOf<MaterialModel>, { places, thickness, dress }: Body): string {
	const sheets = dress && [...layers.map(({ of }) => of), substrate].map(({ sheet }) => sheet ?? null);
	return JSON.stringify([places, thickness, dress?.normals ?? null, sheets]);
}

/** A length, a salt or a treatment says that ions are what conducts in the medium. */
export const ionsStated = ({ debyeLengthNm, salt, ions }: ForceRequest['arrangement']): boolean =>
	debyeLengthNm !== undefined || salt !== undefined || ions !== undefined;

export const ionTreatment = ({ debyeLengthNm, salt, ions }: ForceRequest['arrangement']): IonTreatment =>
	ions ?? (debyeLengthNm === undefined && salt === undefined ? 'full' : 'screened');

/** Debye length in m, given or from the salt. */
function screeningLength(
	{ debyeLengthNm, salt, temperatureK }: ForceRequest['arrangement'],
	{ chi }: Substance
): number {
	if (debyeLengthNm !== undefined) return metresFromNm(debyeLengthNm);
	if (salt === undefined) throw new RangeError('screened by ions of unknown concentration');
	return debyeLength(
		salt.molPerL,
		salt.valence,
		temperatureK,
		salt.staticPermittivity ?? 1 + (chi?.atZero.finite ?? 0)
	);
}

/** Ions are stated by their Debye length: what conducts in the model of the medium is those same ions. */
function withoutCarriers({ chi, mu }: Substance): ZeroFrequencyMaterial {
	return { order: 0, amplitude: chi?.atZero.finite ?? 0, square: 0, mu: mu.atZero, ideal: false };
}

/** 2 d/c in s: turns a frequency into the phase that decides whether retardation matters. */
export const roundTripTime = (separation: number): number => (2 * separation) / SPEED_OF_LIGHT;
