import { debyeLength } from '../../engine/ions.ts';
import type { Study } from '../../schemas/study.ts';

/** Landmarks that give a separation a size one knows, and lengths that belong to the arrangement. */

export interface RulerMark {
	label: string;
	separationNm: number;
	/** Follows from the arrangement or was put there by the reader; drawn stronger. */
	own: boolean;
}

/** hbar c / k_B in nm K, from the exact constants of the SI. */
const THERMAL_NM_K = (((6.62607015e-34 / (2 * Math.PI)) * 299792458) / 1.380649e-23) * 1e9;

/** Round figures of common knowledge, for orientation only. */
const LANDMARKS: RulerMark[] = [
	{ label: 'DNA width', separationNm: 2, own: false },
	{ label: 'virus', separationNm: 100, own: false },
	{ label: 'hair', separationNm: 70_000, own: false }
];

/** The length at which thermal photons take over: hbar c / k_B T. */
export const thermalLengthNm = (temperatureK: number): number => THERMAL_NM_K / temperatureK;

/**
 * @param mediumAtRest  static permittivity of the medium, where it is known and finite: with it salt has a Debye length
 */
export function rulerMarks(
	{
		temperatureK,
		debyeLengthNm,
		salt,
		marks: kept
	}: Pick<Study, 'temperatureK' | 'debyeLengthNm' | 'salt' | 'marks'>,
	equilibria: readonly { letter: string; separationNm: number; stable: boolean }[],
	mediumAtRest: number | null = null
): RulerMark[] {
	const marks = [...LANDMARKS];
	if (temperatureK > 0) {
		marks.push({ label: 'thermal length', separationNm: thermalLengthNm(temperatureK), own: false });
	}
	if (debyeLengthNm !== undefined)
		marks.push({ label: 'Debye length', separationNm: debyeLengthNm, own: true });
	else if (salt && mediumAtRest !== null && temperatureK > 0)
		marks.push({
			label: 'Debye length',
			separationNm: debyeLength(salt.molPerL, salt.valence, temperatureK, mediumAtRest) * 1e9,
			own: true
		});
	marks.push(...kept.map((mark) => ({ ...mark, own: true })));
	for (const { letter, separationNm, stable } of equilibria) {
		marks.push({ label: `${letter} balances, ${stable ? 'stable' : 'unstable'}`, separationNm, own: true });
	}
	return marks;
}

/** Which marks get a label when labels may not cover each other: own ones first, then in order of the axis. */
export function labelled(
	marks: readonly RulerMark[],
	at: (separationNm: number) => number,
	room: number
): Set<RulerMark> {
	const kept: RulerMark[] = [];
	const ranked = [...marks].sort((a, b) => Number(b.own) - Number(a.own));
	for (const mark of ranked) {
		if (kept.every((other) => Math.abs(at(other.separationNm) - at(mark.separationNm)) >= room))
			kept.push(mark);
	}
	return new Set(kept);
}
