import { REDUCED_PLANCK, SPEED_OF_LIGHT } from '../constants.ts';
import type { BoundedFigure, PointAnalysis } from '../contract.ts';
import type { PlateForces } from '../lifshitz/plates.ts';

/** Roundings of the few products that a figure is made with, relative. */
const ROUNDING = 8 * 2 ** -53;

/**
 * Free energy (J/m^2), pressure (Pa) and gradient (Pa/m) of two ideal conductors across vacuum at T = 0 (Casimir 1948;
 * methods.md section 1): F = -pi^2 hbar c/(720 d^3), P = 3 F/d, dP/dd = -12 F/d^2.
 *
 * @param separation  m, > 0
 */
export function idealPlates(separation: number): [number, number, number] {
	const energy = (-(Math.PI ** 2) * REDUCED_PLANCK * SPEED_OF_LIGHT) / (720 * separation ** 3);
	return [energy, (3 * energy) / separation, (-12 * energy) / separation ** 2];
}

/**
 * Effective Hamaker coefficients (J), local exponents and ratios to ideal conductors at one separation (methods.md section
 * 8). Everything follows from F, P and G of the same sweep, so the exponents are exact derivatives and the error bounds
 * are those of the values they are made of.
 *
 * @param separation  m, > 0
 * @param smooth      the same bodies without the roughness that the forces are averaged over; null where there is none
 */
export function pointAnalysis(
	separation: number,
	{ value, bound }: PlateForces,
	smooth: PlateForces | null
): PointAnalysis {
	const d = separation;
	const relative = relativeBounds(value, bound);
	const scaled = (q: number, factor: number): BoundedFigure => bounded(factor * value[q], relative[q]);
	const ideal = idealPlates(d);
	const freeEnergyExponent = quotient(-d * value[1], relative[1], value[0], relative[0]);
	const pressureExponent = quotient(d * value[2], relative[2], value[1], relative[1]);
	return {
		hamakerFromFreeEnergyJ: scaled(0, -12 * Math.PI * d ** 2),
		hamakerFromPressureJ: scaled(1, -6 * Math.PI * d ** 3),
		...(freeEnergyExponent === undefined ? {} : { freeEnergyExponent }),
		...(pressureExponent === undefined ? {} : { pressureExponent }),
		ratioToIdeal: {
			freeEnergy: scaled(0, 1 / ideal[0]),
			pressure: scaled(1, 1 / ideal[1]),
			pressureGradient: scaled(2, 1 / ideal[2])
		},
		...roughnessFactor({ value, bound }, smooth)
	};
}

const relativeBounds = (value: readonly number[], bound: readonly number[]): number[] =>
	value.map((one, q) => (bound[q] === 0 ? 0 : bound[q] / Math.abs(one)));

function roughnessFactor(
	rough: Pick<PlateForces, 'value' | 'bound'>,
	smooth: PlateForces | null
): Pick<PointAnalysis, 'roughnessFactor'> {
	if (smooth === null) return {};
	const [own, other] = [rough, smooth].map(({ value, bound }) => relativeBounds(value, bound));
	const of = (q: number): BoundedFigure | undefined =>
		quotient(rough.value[q], own[q], smooth.value[q], other[q]);
	const [freeEnergy, pressure, pressureGradient] = [of(0), of(1), of(2)];
	// Without a known divisor, at a change of sign, a factor means nothing.
	if (!freeEnergy || !pressure || !pressureGradient) return {};
	return { roughnessFactor: { freeEnergy, pressure, pressureGradient } };
}

/** Finite always, because the answer is sent as JSON; adding zero turns -0 into 0. */
const bounded = (value: number, relative: number): BoundedFigure => ({
	value: value + 0,
	errorBound: Math.min(Number.MAX_VALUE, value === 0 && relative === 0 ? 0 : relative + ROUNDING)
});

/** a/b with relative errors ea and eb; undefined where b is not known from zero. */
function quotient(a: number, ea: number, b: number, eb: number): BoundedFigure | undefined {
	if (b === 0 || !(eb < 1)) return undefined;
	return bounded(a / b, (ea + eb) / (1 - eb));
}
