import { evaluate } from '../../engine/index.ts';
import type { MaterialModel, PermittivityModel } from '../../engine/contract.ts';
import type { ForceChange, ForceChangePoint } from '../../schemas/comparison.ts';
import type { MaterialClass } from '../../schemas/material.ts';
import type { Executor } from '../db/client.ts';
import { database } from '../db/client.ts';
import * as versions from './versions.ts';

/** What a change of one material's permittivity does to the pressure in a few usual arrangements between thick plates. */

/** Gold, silica and water of the library stand for a metal, an insulator and a liquid. */
export const PARTNERS = {
	gold: 'gold-lorentz-drude@1.0',
	silica: 'silica-two-oscillators@1.0',
	water: 'water-parsegian@1.0'
} as const;

/** With the dataset, so that a gold under review is not taken for the gold across from it. */
const PARTNER_WORDS: Record<Exclude<Place, 'x'>, string> = {
	vacuum: 'vacuum',
	gold: 'gold (Lorentz-Drude)',
	silica: 'silica (two oscillators)',
	water: 'water (Parsegian)'
};

export const SEPARATIONS_NM = [5, 10, 30, 100, 300, 1000, 3000];

const ACCURACY = 1e-6;
const TEMPERATURE_K = 300;

/** Names of what stands left, between and right; `x` is the material in question. */
type Place = 'x' | 'vacuum' | keyof typeof PARTNERS;

const AS_BODY: readonly [Place, Place, Place][] = [
	['x', 'vacuum', 'x'],
	['x', 'vacuum', 'gold'],
	['x', 'vacuum', 'silica'],
	['x', 'water', 'x'],
	['x', 'water', 'silica']
];
const AS_MEDIUM: readonly [Place, Place, Place][] = [
	['gold', 'x', 'gold'],
	['gold', 'x', 'silica'],
	['silica', 'x', 'silica']
];

/** @param first  null where nothing came before: then the second stands alone */
export async function usualForceChanges(
	name: string,
	materialClass: MaterialClass,
	first: PermittivityModel | null,
	second: PermittivityModel,
	executor: Executor = database()
): Promise<ForceChange[]> {
	const partners = await partnerModels(executor);
	const arrangements = materialClass === 'liquid' ? AS_MEDIUM : AS_BODY;
	return arrangements
		.filter((places) => places.every((place) => place === 'x' || partners.has(place)))
		.map((places) => {
			const with_ = (x: PermittivityModel) =>
				places.map((place) => (place === 'x' ? x : partners.get(place)));
			return forceChange(wordsFor(places, name), first && with_(first), with_(second), SEPARATIONS_NM);
		})
		.sort(byImportance);
}

/** Sign changes before anything else, then the largest change. */
export const byImportance = (a: ForceChange, b: ForceChange): number =>
	Number(b.signChanges) - Number(a.signChanges) ||
	(b.largestPercent ?? 0) - (a.largestPercent ?? 0) ||
	a.arrangement.localeCompare(b.arrangement);

async function partnerModels(executor: Executor): Promise<Map<Place, PermittivityModel>> {
	const found = await versions.resolve(Object.values(PARTNERS), executor);
	const models = new Map<Place, PermittivityModel>([['vacuum', { kind: 'vacuum' }]]);
	for (const [place, ref] of Object.entries(PARTNERS)) {
		const model = found.get(ref)?.model;
		if (model) models.set(place as Place, model);
	}
	return models;
}

function wordsFor([left, medium, right]: readonly Place[], name: string): string {
	const word = (place: Place) => (place === 'x' ? name : PARTNER_WORDS[place]);
	return `${word(left)} against ${word(right)}, across ${word(medium)}, ${TEMPERATURE_K} K`;
}

type Models = (PermittivityModel | undefined)[];

export function forceChange(
	arrangement: string,
	first: Models | null,
	second: Models,
	separationsNm: readonly number[],
	temperatureK: number = TEMPERATURE_K
): ForceChange {
	const before = first && pressures(first, separationsNm, temperatureK);
	const after = pressures(second, separationsNm, temperatureK);
	const points = separationsNm.map((separationNm, index) =>
		pointOf(separationNm, before ? before[index] : null, after[index])
	);
	const changes = points.flatMap(({ percent }) => (percent === null ? [] : [Math.abs(percent)]));
	return {
		arrangement,
		points,
		largestPercent: changes.length > 0 ? Math.max(...changes) : null,
		signChanges: points.some(({ signChanges }) => signChanges)
	};
}

export interface Pressure {
	pressurePa: number;
	bound: number;
}

function pressures(models: Models, separationsNm: readonly number[], temperatureK: number): Pressure[] {
	const [left, medium, right] = models.map((permittivity): MaterialModel => ({
		permittivity: permittivity ?? { kind: 'vacuum' }
	}));
	const answer = evaluate({
		arrangement: {
			left: { layers: [], substrate: left },
			medium,
			right: { layers: [], substrate: right },
			shape: { kind: 'plates' },
			temperatureK
		},
		separationsNm: [...separationsNm],
		relativeAccuracy: ACCURACY,
		include: []
	});
	return answer.points.map(({ pressurePa, errorBound }) => ({
		pressurePa,
		bound: Math.abs(pressurePa) * errorBound.pressure
	}));
}

export function pointOf(separationNm: number, from: Pressure | null, to: Pressure): ForceChangePoint {
	const difference = from ? to.pressurePa - from.pressurePa : 0;
	return {
		separationNm,
		fromPa: from?.pressurePa ?? null,
		toPa: to.pressurePa,
		percent: from && from.pressurePa !== 0 ? (100 * difference) / Math.abs(from.pressurePa) : null,
		signChanges: from !== null && Math.sign(from.pressurePa) * Math.sign(to.pressurePa) < 0,
		beyondBound: from !== null && Math.abs(difference) > from.bound + to.bound
	};
}
