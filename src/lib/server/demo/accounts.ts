import type { Role } from '../../schemas/person.ts';

/** The Larkmoor Gap Laboratory: who can be tried on in demo mode. None of the addresses exists. */

export interface DemoAccount {
	/** Names the account in the button and in `npm run demo:token`. */
	key: string;
	name: string;
	email: string;
	role: Role;
	groups: { slug: string; lead: boolean }[];
}

export const DEMO_GROUPS = [
	{ slug: 'cantilevers', name: 'Cantilevers' },
	{ slug: 'wet-films', name: 'Wet films' }
] as const;

const account = (key: string, name: string, role: Role, groups: DemoAccount['groups'] = []): DemoAccount => ({
	key,
	name,
	email: `${key}@larkmoor.example`,
	role,
	groups
});

export const DEMO_ACCOUNTS: readonly DemoAccount[] = [
	account('reader', 'Larkmoor reader', 'reader'),
	account('reader-2', 'Larkmoor reader 2', 'reader'),
	account('researcher', 'Larkmoor researcher', 'researcher', [{ slug: 'cantilevers', lead: false }]),
	account('researcher-2', 'Larkmoor researcher 2', 'researcher', [{ slug: 'wet-films', lead: false }]),
	account('lead', 'Larkmoor lead', 'researcher', [{ slug: 'cantilevers', lead: true }]),
	account('curator', 'Larkmoor curator', 'curator', [{ slug: 'cantilevers', lead: false }]),
	account('curator-2', 'Larkmoor curator 2', 'curator', [{ slug: 'wet-films', lead: true }]),
	account('administrator', 'Larkmoor administrator', 'administrator'),
	account('administrator-2', 'Larkmoor administrator 2', 'administrator')
];

/** The account that stands for a role; the second one where two are needed, as for a review. */
export function demoAccount(role: Role, second = false): DemoAccount {
	const key = second ? `${role}-2` : role;
	const found = DEMO_ACCOUNTS.find((candidate) => candidate.key === key);
	if (!found) throw new Error(`There is no demo account ${key}.`);
	return found;
}
