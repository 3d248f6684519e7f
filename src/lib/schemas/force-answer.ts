import { z } from 'zod';

/** What POST /api/v1/forces answers; held equal to the engine's own types by the test beside. */

const parts = z
	.object({ zeroTe: z.number(), zeroTm: z.number(), te: z.number(), tm: z.number() })
	.meta({ id: 'Parts', description: 'Add up to the total; te and tm are all terms n >= 1' });

const bounded = z
	.object({ value: z.number(), errorBound: z.number() })
	.meta({ id: 'BoundedFigure', description: 'errorBound is relative to the magnitude of the value' });

const ofEach = z.object({ freeEnergy: bounded, pressure: bounded, pressureGradient: bounded });

const pointAnalysis = z
	.object({
		hamakerFromFreeEnergyJ: bounded.meta({ description: '-12 pi d^2 F' }),
		hamakerFromPressureJ: bounded.meta({ description: '-6 pi d^3 P' }),
		freeEnergyExponent: bounded.optional().meta({ description: 'd ln|F|/d ln d' }),
		pressureExponent: bounded.optional().meta({ description: 'd ln|P|/d ln d' }),
		ratioToIdeal: ofEach.meta({ description: 'to ideal conductors across vacuum at T = 0' }),
		roughnessFactor: ofEach.optional().meta({ description: 'to the same bodies with smooth surfaces' })
	})
	.meta({ id: 'PointAnalysis' });

const termSeries = z
	.object({ first: z.array(z.number()), rest: z.number(), errorBound: z.number() })
	.meta({ id: 'TermSeries', description: 'n = 0 with its half weight, then n = 1..29, then all others' });

const terms = z
	.object({
		freeEnergyJPerM2: termSeries.optional(),
		pressurePa: termSeries.optional(),
		thermalShare: z
			.object({ freeEnergy: bounded.optional(), pressure: bounded.optional() })
			.meta({ description: '(value - value at T = 0)/value, the models held fixed' })
	})
	.meta({ id: 'Terms', description: 'of smooth plates' });

const elasticity = z
	.object({ freeEnergy: bounded.optional(), pressure: bounded.optional() })
	.meta({ id: 'Elasticity', description: 'relative change of the result per relative change of the input' });

const kernel = z
	.object({
		energiesEv: z.array(z.number()),
		freeEnergyJPerM2PerEv: z.array(z.number()),
		pressurePaPerEv: z.array(z.number()),
		freeEnergyWeight: z.array(z.number().nullable()),
		pressureWeight: z.array(z.number().nullable()),
		errorBound: z.number()
	})
	.meta({ id: 'Kernel', description: "delta P = int kernel delta eps'' d(hbar omega)" });

const placeSensitivity = z
	.object({
		place: z.string(),
		freeEnergyJPerM2: z.array(z.number()),
		pressurePa: z.array(z.number()),
		static: z.object({ freeEnergyJPerM2: z.number(), pressurePa: z.number() }).optional(),
		errorBound: z.number(),
		elasticity,
		sheet: elasticity.optional().meta({ description: 'of the conductivity of a sheet on the place' }),
		kernel,
		reliance: z
			.object({ below: elasticity, inside: elasticity, above: elasticity })
			.optional()
			.meta({ description: 'of what a table has below, inside and above its measured points' })
	})
	.meta({ id: 'PlaceSensitivity' });

const sensitivity = z
	.object({
		xiRadPerS: z.array(z.number()),
		weight: z.array(z.number()),
		places: z.array(placeSensitivity)
	})
	.meta({ id: 'Sensitivity', description: 'derivatives to eps(i xi), of smooth plates' });

const energyAndPressure = z.object({ freeEnergyJPerM2: z.number(), pressurePa: z.number() });

const pointUncertainty = z
	.object({
		freeEnergyJPerM2: bounded,
		pressurePa: bounded,
		beyondFirstOrder: z
			.object({ freeEnergy: z.number(), pressure: z.number() })
			.optional()
			.meta({ description: 'departure of displaced results from the first order, as a share of it' }),
		contributions: z.array(energyAndPressure.extend({ places: z.array(z.string()) }))
	})
	.meta({
		id: 'PointUncertainty',
		description: 'standard uncertainties from what is stated about the data, apart from the numerical bound'
	});

const extent = z.object({ low: z.number(), high: z.number(), errorBound: z.number() });

const spread = z
	.object({ freeEnergyJPerM2: extent, pressurePa: extent, rivals: z.array(energyAndPressure) })
	.meta({ id: 'Spread', description: 'over the arrangement and its rivals' });

/** What belongs to the arrangement as a whole. */
export const wholeAnalysis = z.object({
	nonRetarded: z
		.object({ hamakerJ: bounded.optional(), why: z.string().optional() })
		.optional()
		.meta({ description: 'non-retarded Hamaker coefficient, or why there is none' })
});

export const forcePoint = z
	.object({
		separationNm: z.number(),
		freeEnergyJPerM2: z.number().meta({ description: 'per area; negative attracts' }),
		pressurePa: z.number().meta({ description: '-dF/dd; negative attracts' }),
		pressureGradientPaPerM: z.number().meta({ description: 'dP/dd' }),
		forceN: z.number().optional().meta({ description: 'N, or N/m for the shapes per unit length' }),
		forceGradientNPerM: z.number().optional(),
		errorBound: z
			.object({ freeEnergy: z.number(), pressure: z.number(), pressureGradient: z.number() })
			.meta({ description: 'relative to the value beside it; the true numerical error is never larger' }),
		shapeError: z
			.number()
			.optional()
			.meta({ description: "relative estimate of the proximity approximation's own error" }),
		met: z.boolean(),
		why: z.string().optional(),
		breakdown: z
			.object({ freeEnergyJPerM2: parts, pressurePa: parts, pressureGradientPaPerM: parts })
			.optional(),
		analysis: pointAnalysis.optional(),
		terms: terms.optional(),
		sensitivity: sensitivity.optional(),
		uncertainty: pointUncertainty.optional(),
		spread: spread.optional()
	})
	.meta({ id: 'ForcePoint' });

export const equilibrium = z.object({
	separationNm: z.number(),
	stable: z.boolean(),
	stiffnessPaPerM: z.number()
});

export const warning = z.object({ code: z.string(), text: z.string() });

/** The engine's answer with the checksum that its caller adds. */
export const forceAnswer = z
	.object({
		engine: z.string(),
		inputChecksum: z.string().regex(/^sha256:[0-9a-f]{64}$/),
		points: z.array(forcePoint),
		equilibria: z.array(equilibrium),
		warnings: z.array(warning),
		...wholeAnalysis.shape
	})
	.meta({ id: 'ForceAnswer' });

export const errorAnswer = z
	.object({
		error: z.object({
			code: z.string(),
			message: z.string(),
			issues: z.array(z.object({ path: z.string(), message: z.string() })).optional()
		})
	})
	.meta({ id: 'Error' });

export type ForceAnswerJson = z.infer<typeof forceAnswer>;
export type ErrorAnswer = z.infer<typeof errorAnswer>;
