import { z } from 'zod';
import { highEnd, lowEnd } from './permittivity.ts';
import { line, lines } from './plain-text.ts';
import { sourceSlug } from './source.ts';
import { energyRangeEv, quality, sample, versionNumber } from './version.ts';

/** The contract's `description`: what the columns of an uploaded table mean and what is known about it. */

export const abscissaUnit = z.enum(['eV', 'nm', 'um', 'cm^-1', 'Hz', 'rad/s']);
export const quantity = z.enum(['n', 'k', 'epsilon1', 'epsilon2', 'epsilonImaginary']);

/** Columns count from 1, as a person counts them in the file. */
const column = z.int().min(1).max(200);

/** What a column holds: a quantity, or the uncertainty of the quantity in another column. */
const ordinate = z
	.strictObject({ column, quantity: quantity.optional(), uncertaintyOf: column.optional() })
	.refine(({ quantity: what, uncertaintyOf }) => (what === undefined) !== (uncertaintyOf === undefined), {
		error: 'give either quantity or uncertaintyOf'
	});

const ascendingRange = energyRangeEv.refine(({ low, high }) => low >= 0 && low < high, {
	error: 'low must be at least 0 and below high'
});

export const tableReading = z.strictObject({
	delimiter: z.enum([',', ';', '\t', ' ']).optional(),
	decimal: z.enum(['.', ',']).optional(),
	skipRows: z.int().min(0).max(10_000).default(0),
	abscissa: z.strictObject({ column, unit: abscissaUnit }),
	ordinates: z.array(ordinate).min(1).max(4),
	duplicates: z.enum(['refuse', 'merge-equal']).default('refuse'),
	/** Rows of a second table that continues the file, in the same columns and units. */
	joined: z
		.string()
		.max(200_000)
		.regex(/^(?:[^\p{Cc}\p{Cs}]|[\n\r\t])*$/u, 'no control characters')
		.optional(),
	lowEnd: lowEnd.default({ kind: 'none' }),
	highEnd: highEnd.default({ kind: 'none' })
});

const about = {
	/** Slugs of sources; the first is the one that lists name. */
	source: z.union([sourceSlug, z.array(sourceSlug).min(1).max(20)]),
	quality: quality.default('provisional'),
	qualityReason: line(500).nullable().default(null),
	/** Where measured numbers stand behind a closed form; a table has its own. */
	measuredRangeEv: ascendingRange.nullable().default(null),
	validRangeEv: ascendingRange.nullable().default(null),
	sample: sample.nullable().default(null),
	note: lines(4000).nullable().default(null),
	parent: versionNumber.nullable().default(null)
};

export const modelDescription = z.strictObject(about);
export const tableDescription = tableReading.extend(about);

export type AbscissaUnit = z.infer<typeof abscissaUnit>;
export type Quantity = z.infer<typeof quantity>;
export type TableReading = z.infer<typeof tableReading>;
export type ModelDescription = z.infer<typeof modelDescription>;
export type TableDescription = z.infer<typeof tableDescription>;

/** Body of submit, approve, return and withdraw. `checksum` is of the content that the caller saw. */
const checksum = z.string().regex(/^sha256:[0-9a-f]{64}$/, 'sha256: and 64 hexadecimal digits');
const reason = lines(2000);

export const submission = z.strictObject({
	checksum,
	reason: reason.nullish(),
	/** Code of a warning to the reason why it stands. */
	answers: z.record(z.string().max(60), lines(2000)).default({})
});
/** When the version that the reviewer saw was submitted: a later submission of the same numbers is another one. */
const submittedAt = z.iso.datetime().optional();
export const approval = z.strictObject({ checksum, submittedAt, reason: reason.nullish() });
export const refusal = z.strictObject({ checksum, submittedAt, reason });

/** Why this one and not the newest. */
export const recommendation = z.strictObject({ reason });

export type Recommendation = z.infer<typeof recommendation>;
export type Submission = z.infer<typeof submission>;
export type Approval = z.infer<typeof approval>;
export type RefusalOfVersion = z.infer<typeof refusal>;
export type Ordinate = z.infer<typeof ordinate>;

/** The form of an upload as typed, with the count of savings that it began from. */
export const savedForm = z.strictObject({
	revision: z.int().min(0),
	form: z.record(z.string().max(60), z.string().regex(/^[^\p{Cs}\0]*$/u, 'no characters cut in two'))
});
