import { z } from 'zod';
import { highEnd, lowEnd } from './permittivity.ts';
import { energyRangeEv, quality, sample, versionNumber } from './version.ts';

/** The contract's `description`: what the columns of an uploaded table mean and what is known about it. */

export const abscissaUnit = z.enum(['eV', 'nm', 'um', 'cm^-1', 'Hz', 'rad/s']);
export const quantity = z.enum(['n', 'k', 'epsilon1', 'epsilon2', 'epsilonImaginary']);

/** Columns count from 1, as a person counts them in the file. */
const column = z.int().min(1).max(200);

export const tableReading = z.strictObject({
	delimiter: z.enum([',', ';', '\t', ' ']).optional(),
	decimal: z.enum(['.', ',']).optional(),
	skipRows: z.int().min(0).max(10_000).default(0),
	abscissa: z.strictObject({ column, unit: abscissaUnit }),
	ordinates: z.array(z.strictObject({ column, quantity })).min(1).max(2),
	duplicates: z.enum(['refuse', 'merge-equal']).default('refuse'),
	lowEnd: lowEnd.default({ kind: 'none' }),
	highEnd: highEnd.default({ kind: 'none' })
});

const about = {
	/** Slugs of sources; the first is the one that lists name. */
	source: z.union([z.string(), z.array(z.string()).min(1).max(20)]),
	quality: quality.default('provisional'),
	qualityReason: z.string().min(1).max(500).nullable().default(null),
	/** Where measured numbers stand behind a closed form; a table has its own. */
	measuredRangeEv: energyRangeEv.nullable().default(null),
	validRangeEv: energyRangeEv.nullable().default(null),
	sample: sample.nullable().default(null),
	note: z.string().max(4000).nullable().default(null),
	parent: versionNumber.nullable().default(null)
};

export const modelDescription = z.strictObject(about);
export const tableDescription = tableReading.extend(about);

export type AbscissaUnit = z.infer<typeof abscissaUnit>;
export type Quantity = z.infer<typeof quantity>;
export type TableReading = z.infer<typeof tableReading>;
export type ModelDescription = z.infer<typeof modelDescription>;
export type TableDescription = z.infer<typeof tableDescription>;
