import { z } from 'zod';
import type { ForceRequestOf, PermittivityModel, SheetModel } from '../engine/contract.ts';
import { LAYERS_MAX, shape, versionRef, zeroFrequencyRule } from './arrangement.ts';
import { permeabilityModel, permittivityModel } from './permittivity.ts';

/** The contract's request to the engine, for callers outside: a material is a pinned version or a model in place. */

export { LAYERS_MAX, shape, versionRef, zeroFrequencyRule };

/** What a request gets where it is silent. */
export const FORCE_DEFAULTS = { relativeAccuracy: 1e-6, temperatureK: 300 } as const;

export const SEPARATIONS_MAX = 2000;
export const HEIGHT_BINS_MAX = 200;
export const TABLE_ROWS_MAX = 20_000;
export const PARAMETERS_MAX = 60;
export const RIVALS_MAX = 20;
/** Optional parts of an answer. */
export const EXTRAS = ['breakdown', 'analysis', 'terms', 'sensitivity', 'uncertainty'] as const;

export const uncertainty = z
	.discriminatedUnion('kind', [
		z.strictObject({ kind: z.literal('scale'), relative: z.number().nonnegative() }),
		z.strictObject({
			kind: z.literal('table'),
			energiesEv: z.array(z.number().positive()).min(1).max(TABLE_ROWS_MAX),
			relative: z.array(z.number().nonnegative()).min(1).max(TABLE_ROWS_MAX),
			correlation: z.enum(['common', 'independent'])
		}),
		z.strictObject({
			kind: z.literal('parameters'),
			names: z.array(z.string().max(60)).min(1).max(PARAMETERS_MAX),
			covariance: z.array(z.array(z.number()).max(PARAMETERS_MAX)).max(PARAMETERS_MAX)
		})
	])
	.meta({ id: 'Uncertainty', description: 'standard uncertainty of a permittivity' });

/** Two permittivities in one place: the phases of a mixture and the axis of a crystal may be pinned versions too. */
const phaseDescribed = z
	.union([z.strictObject({ version: versionRef }), permittivityModel])
	.meta({ id: 'Phase', description: 'of a mixture: a pinned version or a model' });

export type Phase = { version: string } | PermittivityModel;

const phase: z.ZodType<Phase> = z
	.unknown()
	.transform((value, context): Phase => told(value, phaseDescribed.options, context))
	.meta({ id: 'Phase' });

const MIXTURES = ['maxwellGarnett', 'bruggeman'] as const;

const mixtureOf = <P extends z.ZodType>(of: P) =>
	z.strictObject({ kind: z.enum(MIXTURES), host: of, inclusion: of, fraction: z.number().min(0).max(1) });

const mixtureOfVersions = mixtureOf(phase);

/** A model, or a mixture whose phases name versions. */
export type PermittivityChoice = PermittivityModel | z.infer<typeof mixtureOfVersions>;

const permittivityChoice: z.ZodType<PermittivityChoice> = z
	.unknown()
	.transform((value, context): PermittivityChoice => {
		const mixed =
			typeof value === 'object' &&
			value !== null &&
			'kind' in value &&
			MIXTURES.some((kind) => kind === value.kind);
		return mixed
			? passed(mixtureOfVersions.safeParse(value), context)
			: passed(permittivityModel.safeParse(value), context);
	})
	.meta({ id: 'PermittivityModel' });

export const sheetModel: z.ZodType<SheetModel> = z
	.discriminatedUnion('kind', [
		z.strictObject({ kind: z.literal('constant'), siemens: z.number().positive() }),
		z.strictObject({
			kind: z.literal('drude'),
			siemens: z.number().positive(),
			dampingEv: z.number().positive()
		})
	])
	.meta({ id: 'Sheet', description: 'a layer of no thickness that conducts, on the face towards the gap' });

const normalOptions = [
	z.strictObject({ version: versionRef }),
	z.strictObject({ permittivity: permittivityModel })
] as const;

export type NormalChoice = { version: string } | { permittivity: PermittivityModel };

const normal: z.ZodType<NormalChoice> = z
	.unknown()
	.transform((value, context): NormalChoice => told(value, normalOptions, context))
	.meta({ id: 'Normal' });

const withDress = <N extends z.ZodType>(along: N) => ({
	normal: along.optional(),
	sheet: sheetModel.optional(),
	zeroFrequency: zeroFrequencyRule.optional(),
	uncertainty: uncertainty.optional()
});

const pinned = z.strictObject({ version: versionRef, ...withDress(normal) });
const inPlace = z.strictObject({
	permittivity: permittivityChoice,
	permeability: permeabilityModel.optional(),
	...withDress(normal)
});

export type PinnedMaterial = z.infer<typeof pinned>;
export type InPlaceMaterial = z.infer<typeof inPlace>;
export type MaterialChoice = PinnedMaterial | InPlaceMaterial;

const STRAY_FIELD = 'is not a field here; check the spelling or leave it out';

/** Told apart by the field `version`, so that a slip inside a model is reported where it is and not as "no alternative fits". */
function told<V, M>(
	value: unknown,
	[byVersion, byModel]: readonly [z.ZodType<V>, z.ZodType<M>],
	context: z.RefinementCtx
): V | M {
	const named = typeof value === 'object' && value !== null && 'version' in value;
	return named ? passed(byVersion.safeParse(value), context) : passed(byModel.safeParse(value), context);
}

function passed<T>(parsed: z.ZodSafeParseResult<T>, context: z.RefinementCtx): T {
	if (parsed.success) return parsed.data;
	for (const issue of parsed.error.issues) {
		if (issue.code !== 'unrecognized_keys')
			context.addIssue({ code: 'custom', path: issue.path, message: issue.message });
		else
			for (const key of issue.keys)
				context.addIssue({ code: 'custom', path: [...issue.path, key], message: STRAY_FIELD });
	}
	return z.NEVER;
}

export const materialChoice: z.ZodType<MaterialChoice> = z
	.unknown()
	.transform((value, context): MaterialChoice => told(value, [pinned, inPlace], context))
	.meta({ id: 'MaterialChoice' });

/** The same for the API's description, where a transform cannot be drawn. */
const dressDescribed = withDress(
	z.union(normalOptions).meta({ description: 'along the normal of a uniaxial body' })
);
export const materialChoiceDescribed = z
	.union([
		z.strictObject({ version: versionRef, ...dressDescribed }),
		z.strictObject({
			permittivity: z.union([permittivityModel, mixtureOf(phaseDescribed)]),
			permeability: permeabilityModel.optional(),
			...dressDescribed
		})
	])
	.meta({ id: 'MaterialChoice' });

const lengthNm = z.number().positive();

export const body = z.strictObject({
	layers: z
		.array(z.strictObject({ of: materialChoice, thicknessNm: lengthNm }))
		.max(LAYERS_MAX)
		.default([]),
	substrate: materialChoice
});

export const salt = z
	.strictObject({
		molPerL: z.number().positive(),
		valence: z.int().positive(),
		staticPermittivity: z.number().min(1).optional()
	})
	.meta({ id: 'Salt', description: 'z:z electrolyte in the medium, instead of debyeLengthNm' });

export const ionTreatment = z.enum(['full', 'screened', 'off']).meta({
	id: 'IonTreatment',
	description: 'what mobile ions do to the n = 0 TM term: nothing, screen it, take it away'
});

export const heights = z
	.discriminatedUnion('kind', [
		z.strictObject({ kind: z.literal('rms'), rmsNm: z.number().nonnegative() }),
		z.strictObject({
			kind: z.literal('histogram'),
			heightsNm: z.array(z.number()).min(1).max(HEIGHT_BINS_MAX),
			weights: z.array(z.number().nonnegative()).min(1).max(HEIGHT_BINS_MAX)
		})
	])
	.meta({ id: 'Heights', description: 'about the mean plane, positive into the gap' });

export const arrangement = z.strictObject({
	left: body,
	medium: materialChoice,
	right: body,
	shape: shape.default({ kind: 'plates' }),
	temperatureK: z.number().nonnegative().default(FORCE_DEFAULTS.temperatureK),
	debyeLengthNm: lengthNm.optional(),
	salt: salt.optional(),
	ions: ionTreatment.optional(),
	roughness: z.strictObject({ left: heights.optional(), right: heights.optional() }).optional()
});

export const separations = z.union([
	z.array(lengthNm).min(1).max(SEPARATIONS_MAX),
	z.strictObject({
		from: lengthNm,
		to: lengthNm,
		count: z.int().min(1).max(SEPARATIONS_MAX),
		spacing: z.enum(['log', 'linear']).default('log')
	})
]);

export const forceRequest = z.strictObject({
	arrangement,
	separationsNm: separations,
	relativeAccuracy: z.number().min(1e-11).max(1e-3).default(FORCE_DEFAULTS.relativeAccuracy),
	include: z.array(z.enum(EXTRAS)).max(EXTRAS.length).default([]),
	rivals: z
		.array(z.strictObject({ places: z.array(z.string().max(40)).min(1).max(82), of: materialChoice }))
		.max(RIVALS_MAX)
		.optional()
		.meta({ description: 'other materials at some places; results are given as a spread' })
});

/** As it comes in, defaults still open. */
export type ForceRequestInput = z.input<typeof forceRequest>;
/** Complete: every default filled in. */
export type ForceRequestComplete = ForceRequestOf<MaterialChoice>;
