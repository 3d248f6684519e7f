import { z } from 'zod';

/** People and what they may ask of the installation, as product.md section 1 names them. */

export const ROLES = ['reader', 'researcher', 'curator', 'administrator'] as const;

export const role = z.enum(ROLES, { error: `a role is one of ${ROLES.join(', ')}` });
export type Role = z.infer<typeof role>;

export const PERSON_STATES = ['active', 'removed', 'deleted'] as const;
export type PersonState = (typeof PERSON_STATES)[number];

/** Compared in lower case everywhere: an address is one account, however it is typed. */
export const emailAddress = z
	.string({ error: 'give an e-mail address' })
	.trim()
	.toLowerCase()
	.max(254, 'an e-mail address has at most 254 characters')
	.pipe(z.email('that is not an e-mail address; it reads name@place.example'));

export const personName = z
	.string({ error: 'give a name' })
	.trim()
	.min(1, 'give a name')
	.max(120, 'a name has at most 120 characters')
	.regex(/^[^\p{Cc}]*$/u, 'a name has no control characters');

export const UNIT_CHOICES = {
	separation: ['auto', 'nm', 'um'],
	pressure: ['auto', 'Pa', 'mPa', 'kPa'],
	energy: ['eV', 'um']
} as const;

/** Everything a person may set about how the application behaves towards them; nothing else is accepted. */
export const preferences = z.strictObject({
	separationUnit: z.enum(UNIT_CHOICES.separation).default('auto'),
	pressureUnit: z.enum(UNIT_CHOICES.pressure).default('auto'),
	energyUnit: z.enum(UNIT_CHOICES.energy).default('eV'),
	/** Mail about reviews, new versions of what one's studies use, and comments. */
	mailAboutReviews: z.boolean().default(true),
	mailAboutVersions: z.boolean().default(true)
});
export type Preferences = z.infer<typeof preferences>;

export const PREFERENCES_BY_DEFAULT: Preferences = preferences.parse({});

/** What every page is told about who is signed in. */
export interface AccountSummary {
	name: string;
	role: Role;
	/** Units that pages begin with; what was left to each number is not named. */
	units: { length?: string; pressure?: string; photon: 'eV' | 'um' };
}

export const profileChange = z.strictObject({ name: personName, preferences });
export type ProfileChange = z.infer<typeof profileChange>;

/** What pages and services know about who is asking. */
export interface SignedIn {
	id: string;
	name: string;
	email: string;
	role: Role;
	preferences: Preferences;
	/** Groups the person is in, and whether as a lead. */
	groups: { id: string; slug: string; name: string; lead: boolean }[];
}
