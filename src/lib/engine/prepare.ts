import { equilibriaBetween } from './analysis/equilibrium.ts';
import type {
	Breakdown,
	Equilibrium,
	ForceAnswer,
	ForcePoint,
	ForceRequest,
	Parts,
	Warning,
	WholeAnalysis
} from './contract.ts';
import { plates, type PlateForces } from './lifshitz/plates.ts';
import { nonRetardedLimit } from './analysis/non-retarded.ts';
import { pointAnalysis } from './analysis/point-analysis.ts';
import { withRival } from './analysis/places.ts';
import { COMPARED_ACCURACY } from './analysis/beyond-first-order.ts';
import { pointUncertainty, spreadOver } from './analysis/uncertainty.ts';
import { sensitivity } from './analysis/sensitivity.ts';
import { terms } from './analysis/terms.ts';
import { lineForces } from './shapes/cylinder.ts';
import { shapeError, shapeRule, type ShapeRule } from './shapes/proximity.ts';
import { ROUGHNESS_SHARE, roughPlates } from './shapes/roughness.ts';
import { atItsTemperature } from './thermal-request.ts';
import { systemOf } from './system.ts';
import { metresFromNm } from './units.ts';
import { checkRequest, separationsOf } from './validate.ts';
import { ENGINE_VERSION } from './version.ts';
import { warningsFor } from './warnings.ts';

/** A checked request with everything computed that does not depend on the separation. */
export interface Preparation {
	readonly separationsNm: readonly number[];
	/** The same bits in whatever order and however often points are asked for. */
	point(index: number): ForcePoint;
	/** Separations where the pressure of the plates vanishes, between the given points. */
	equilibria(points: readonly ForcePoint[]): Equilibrium[];
	warnings(points: readonly ForcePoint[]): Warning[];
	/** What was asked for about the arrangement as a whole. */
	whole(): WholeAnalysis;
}

/** Plates below a curved shape are computed finer, so that their bound leaves room for the shape's own integral. */
const LINE_SHARE = 0.3;

/**
 * Checks a request and prepares its computation; points may then be computed one by one, in chunks, in any order.
 *
 * @throws Refusal for absurd or unphysical input, listing every problem
 */
export function prepare(request: ForceRequest): Preparation {
	checkRequest(request);
	return prepared(atItsTemperature(request), request);
}

function prepared(request: ForceRequest, asked: ForceRequest): Preparation {
	const separationsNm = separationsOf(request.separationsNm);
	const { relativeAccuracy, include, arrangement } = request;
	const system = systemOf(request);
	const rule = shapeRule(arrangement.shape);
	const { roughness } = arrangement;
	const platesAccuracy = rule.kind === 'line' ? LINE_SHARE * relativeAccuracy : relativeAccuracy;
	const smooth = plates(system, roughness ? ROUGHNESS_SHARE * platesAccuracy : platesAccuracy);
	const evaluatePlates = roughness ? roughPlates(smooth, roughness, platesAccuracy) : smooth;
	const breakdown = include.includes('breakdown');
	const analysis = include.includes('analysis');
	const wantsTerms = include.includes('terms');
	const rivals = (request.rivals ?? []).map((rival) => {
		const other = { ...request, arrangement: withRival(arrangement, rival) };
		const evaluateRival = plates(
			systemOf(other),
			roughness ? ROUGHNESS_SHARE * platesAccuracy : platesAccuracy
		);
		return roughness ? roughPlates(evaluateRival, roughness, platesAccuracy) : evaluateRival;
	});
	const wantsUncertainty = include.includes('uncertainty');
	const compared = plates(system, COMPARED_ACCURACY);
	const wantsSensitivity = include.includes('sensitivity');
	const cold =
		wantsTerms && system.temperature > 0
			? plates(systemOf(atZeroTemperature(request)), relativeAccuracy)
			: null;
	return {
		separationsNm,
		point: (index) => {
			const separationNm = separationsNm[index];
			if (separationNm === undefined) throw new RangeError(`there is no point ${index}`);
			const separation = metresFromNm(separationNm);
			const forces = evaluatePlates(separation);
			const line =
				rule.kind === 'line' ? lineForces(evaluatePlates, separation, rule.radius, relativeAccuracy) : null;
			const lineError =
				line === null
					? 0
					: Math.max(relative(line.force, line.forceBound), relative(line.gradient, line.gradientBound));
			const errorBound = {
				freeEnergy: relative(forces.value[0], forces.bound[0]),
				pressure: relative(forces.value[1], forces.bound[1]),
				pressureGradient: relative(forces.value[2], forces.bound[2])
			};
			const worst = Math.max(
				errorBound.freeEnergy,
				errorBound.pressure,
				errorBound.pressureGradient,
				lineError
			);
			const met = worst <= relativeAccuracy;
			const estimate = shapeError(rule, separation, zeroShare(forces, rule.kind === 'line' ? 1 : 0));
			return {
				separationNm,
				freeEnergyJPerM2: forces.value[0],
				pressurePa: forces.value[1],
				pressureGradientPaPerM: forces.value[2],
				...shapeForces(rule, forces, line),
				errorBound,
				...(estimate === undefined ? {} : { shapeError: estimate }),
				met,
				...(met ? {} : { why: whyNot(forces, relativeAccuracy, lineError) }),
				...(breakdown ? { breakdown: breakdownOf(forces) } : {}),
				...(analysis
					? { analysis: pointAnalysis(separation, forces, roughness ? smooth(separation) : null) }
					: {}),
				...(wantsTerms
					? { terms: terms(system, separation, smooth(separation), cold?.(separation) ?? null) }
					: {}),
				...(wantsSensitivity
					? { sensitivity: sensitivity(system, request, separation, smooth(separation)) }
					: {}),
				...(wantsUncertainty
					? { uncertainty: pointUncertainty(system, request, separation, compared(separation)) }
					: {}),
				...(rivals.length > 0
					? {
							spread: spreadOver(
								forces,
								rivals.map((rival) => rival(separation))
							)
						}
					: {})
			};
		},
		equilibria: (points) => equilibriaBetween(points, evaluatePlates),
		whole: () => (analysis ? { nonRetarded: nonRetardedLimit(system) } : {}),
		warnings: (points) => warningsFor(asked, points)
	};
}

/**
 * Free energy, pressure and pressure gradient, force where the shape has one, each with a bound on its numerical error
 * (methods.md sections 1 to 5); negative energy, pressure and force attract.
 *
 * @throws Refusal for absurd or unphysical input, listing every problem
 */
export function evaluate(request: ForceRequest): ForceAnswer {
	const preparation = prepare(request);
	const points = preparation.separationsNm.map((_, index) => preparation.point(index));
	return {
		engine: ENGINE_VERSION,
		points,
		equilibria: preparation.equilibria(points),
		warnings: preparation.warnings(points),
		...preparation.whole()
	};
}

/** The same models without warmth: ions, which need it, do not move then. */
function atZeroTemperature(request: ForceRequest): ForceRequest {
	const { debyeLengthNm: _length, salt: _salt, ions: _ions, ...rest } = request.arrangement;
	return { ...request, arrangement: { ...rest, temperatureK: 0 } };
}

/** A bound relative to its value; finite always, because the answer is sent as JSON. */
function relative(value: number, bound: number): number {
	if (bound === 0) return 0;
	return Math.min(Number.MAX_VALUE, bound / Math.abs(value));
}

function shapeForces(
	rule: ShapeRule,
	{ value }: PlateForces,
	line: { force: number; gradient: number } | null
): { forceN?: number; forceGradientNPerM?: number } {
	if (rule.kind === 'point')
		return { forceN: rule.factor * value[0], forceGradientNPerM: -rule.factor * value[1] };
	if (line !== null) return { forceN: line.force, forceGradientNPerM: line.gradient };
	return {};
}

/** Share of the n = 0 term in free energy (0) or pressure (1). */
function zeroShare({ parts, value }: PlateForces, quantity: 0 | 1): number {
	const at = 4 * quantity;
	return value[quantity] === 0 ? 0 : Math.abs((parts[at] + parts[at + 1]) / value[quantity]);
}

function breakdownOf({ parts }: PlateForces): Breakdown {
	const of = (quantity: number): Parts => {
		const [zeroTe, zeroTm, te, tm] = parts.subarray(4 * quantity, 4 * quantity + 4);
		return { zeroTe, zeroTm, te, tm };
	};
	return { freeEnergyJPerM2: of(0), pressurePa: of(1), pressureGradientPaPerM: of(2) };
}

const NAMES = ['free energy', 'pressure', 'pressure gradient'];

/** Terms of both signs count as cancelling from here on. */
const CANCELLING = 3;

function whyNot(forces: PlateForces, accuracy: number, lineError: number): string {
	const { value, bound, cancellation, roundingShare } = forces;
	const missed = [0, 1, 2].filter((q) => relative(value[q], bound[q]) > accuracy);
	if (missed.length === 0)
		return `The integral over the curved shape is known to ${lineError.toExponential(1)} only.`;
	const reasons = missed.map((q) => {
		const reached = relative(value[q], bound[q]);
		const loss = cancellation[q];
		const figure =
			reached < 1 ? `is known to ${reached.toExponential(1)}` : 'is not known, not even its sign,';
		const cause =
			loss > CANCELLING
				? `because terms of opposite sign cancel to 1/${loss.toPrecision(2)} of their sizes`
				: roundingShare[q] > 0.5
					? 'because rounding in double precision sets the limit'
					: 'because the finest rules of integration reach no further';
		return `The ${NAMES[q]} ${figure} ${cause}.`;
	});
	return reasons.join(' ');
}
