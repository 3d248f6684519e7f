import { z } from 'zod';
import { line, lines } from './plain-text.ts';

/** A bibliographic reference with licence. */

export const sourceKind = z.enum(['article', 'book', 'measurement', 'standard', 'computation']);

export const sourceSlug = z
	.string()
	.max(80)
	.regex(
		/^[a-z0-9]+(-[a-z0-9]+)*$/,
		'lower-case letters, digits and single hyphens, as johnson-christy-1972'
	);

export const sourceFields = z.strictObject({
	slug: sourceSlug,
	title: line(500),
	/** Family name first, as "Johnson, P. B."; an institution is written in full without a comma. */
	authors: z.array(line(200)).min(1).max(60),
	year: z.int().min(1600).max(2200),
	kind: sourceKind,
	/** Journal, series or book that carries it, with volume and pages as printed. */
	container: line(300).nullable().default(null),
	volume: line(40).nullable().default(null),
	pages: line(60).nullable().default(null),
	doi: z
		.string()
		.max(300)
		.regex(/^10\.\d{4,9}\/[^\s\p{Cc}\p{Cs}]+$/u, 'a DOI starts with 10. and has no address before it')
		.nullable()
		.default(null),
	url: z
		.url({ protocol: /^https?$/ })
		.max(1000)
		.regex(/^https?:\/\/[^\s\p{Cc}\p{Cs}]+$/u, 'an address that begins with https:// or http://')
		.nullable()
		.default(null),
	/** SPDX identifier, or null where only facts were taken and no licence applies to them. */
	licence: z
		.string()
		.max(80)
		.regex(/^[A-Za-z0-9.+-]+$/, 'an SPDX identifier, as CC-BY-4.0')
		.nullable()
		.default(null),
	/** How the figures were compared with the paper, and what is still to be compared. */
	note: lines(2000).nullable().default(null)
});

export const source = sourceFields.extend({ citation: z.string() }).meta({ id: 'Source' });

export type SourceKind = z.infer<typeof sourceKind>;
export type SourceFields = z.infer<typeof sourceFields>;
/** `citation` is the short form for lists: "Johnson and Christy 1972". */
export type Source = z.infer<typeof source>;
