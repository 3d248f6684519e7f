import { readFileSync } from 'node:fs';
import { evaluate, type ForcePoint, type ForceRequest } from '../../src/lib/engine/index.ts';

/** A figure from the world outside with the request that should give it. */
export interface Figure {
	id: string;
	field: string;
	/** What the answer is divided by before it is compared. */
	over?: 'idealPressure' | 'idealEnergy' | null;
	value: number;
	relTol: number;
	source: string;
	request: Pick<ForceRequest, 'arrangement' | 'separationsNm'>;
}

export function figures(file: string): Figure[] {
	const text = readFileSync(new URL(file, import.meta.url), 'utf8');
	return (JSON.parse(text) as { checks: Figure[] }).checks;
}

const HBAR_C = (6.62607015e-34 / (2 * Math.PI)) * 299792458;

/** Ideal conductors at T = 0: -pi^2 hbar c/(240 d^4) and -pi^2 hbar c/(720 d^3). */
const IDEAL = {
	idealPressure: (d: number) => (-(Math.PI ** 2) * HBAR_C) / (240 * d ** 4),
	idealEnergy: (d: number) => (-(Math.PI ** 2) * HBAR_C) / (720 * d ** 3)
};

/** What the engine says at its tightest, in the units of the figure. */
export function computed(figure: Figure): { value: number; bound: number; point: ForcePoint } {
	const answer = evaluate({ ...figure.request, relativeAccuracy: 1e-11, include: ['breakdown'] });
	const point = answer.points[0];
	const d = point.separationNm * 1e-9;
	const divisor = figure.over ? IDEAL[figure.over](d) : 1;
	const hamaker = figure.field.startsWith('-12*pi*d^2*') ? -12 * Math.PI * d * d : 1;
	const path = figure.field.replace('-12*pi*d^2*', '').split('.');
	const value = path.reduce<unknown>((part, key) => (part as Record<string, unknown>)[key], point);
	return { value: (Number(value) * hamaker) / divisor, bound: boundOf(point, figure.field), point };
}

function boundOf(point: ForcePoint, field: string): number {
	const { errorBound, shapeError } = point;
	if (field === 'forceN')
		return shapeError === undefined
			? errorBound.freeEnergy
			: Math.max(errorBound.freeEnergy, errorBound.pressure);
	if (field === 'forceGradientNPerM') return Math.max(errorBound.pressure, errorBound.pressureGradient);
	if (/freeEnergy/.test(field)) return errorBound.freeEnergy;
	return /Gradient/.test(field) ? errorBound.pressureGradient : errorBound.pressure;
}
