import { z } from 'zod';
import { versionRef } from './arrangement.ts';
import { TEMPERATURE_RANGE_K } from './study-limits.ts';

/** What the new studies of a group begin with. The rule of conduction has no default of its own: somebody states it. */

export const conduction = z.enum(['drude', 'plasma'], { error: 'choose Drude or plasma' });

export const temperatureK = z.coerce
	.number({ error: 'a number of kelvin' })
	.refine(
		(value) => value === 0 || (value >= TEMPERATURE_RANGE_K.min && value <= TEMPERATURE_RANGE_K.max),
		`0, or between ${TEMPERATURE_RANGE_K.min} and ${TEMPERATURE_RANGE_K.max} K`
	);

export const groupDefaults = z.strictObject({
	conduction,
	/** The version of gold that the group computes with; null where it does not say. */
	gold: versionRef.nullable(),
	temperatureK
});

export const newFromArrangement = z.strictObject({
	name: z.string().trim().max(200),
	/** Place in the list of worked arrangements. */
	begin: z.coerce.number().int().min(0),
	/** Slug of a group of one's own, or nothing. */
	group: z.string().max(80),
	conduction,
	temperatureK
});

export type GroupDefaults = z.infer<typeof groupDefaults>;
export type NewFromArrangement = z.infer<typeof newFromArrangement>;
