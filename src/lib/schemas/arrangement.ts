import { z } from 'zod';

/** What a request and a study have in common; apart from the models, so that the page of a study need not carry those. */

export const LAYERS_MAX = 40;

export const versionRef = z
	.string()
	.max(120)
	.regex(/^[a-z0-9]+(-[a-z0-9]+)*@\d+\.\d+$/, 'a version is named slug@major.minor, as gold-drude@1.0')
	.meta({ id: 'VersionRef', example: 'gold-drude@1.0' });

export const zeroFrequencyRule = z
	.enum(['drude', 'plasma', 'ideal', 'dcCounted', 'dcIgnored'])
	.meta({ id: 'ZeroFrequencyRule' });

const radiusUm = z.number().positive().max(1e6);

export const shape = z
	.discriminatedUnion('kind', [
		z.strictObject({ kind: z.literal('plates') }),
		z.strictObject({ kind: z.literal('spherePlate'), radiusUm }),
		z.strictObject({ kind: z.literal('spheres'), leftRadiusUm: radiusUm, rightRadiusUm: radiusUm }),
		z.strictObject({ kind: z.literal('crossedCylinders'), leftRadiusUm: radiusUm, rightRadiusUm: radiusUm }),
		z.strictObject({ kind: z.literal('cylinderPlate'), radiusUm }),
		z.strictObject({ kind: z.literal('parallelCylinders'), leftRadiusUm: radiusUm, rightRadiusUm: radiusUm })
	])
	.meta({ id: 'Shape' });
