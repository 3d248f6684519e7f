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
		analysis: pointAnalysis.optional()
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
