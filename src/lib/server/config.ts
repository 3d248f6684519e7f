import { z } from 'zod';

/** Settings from the environment, read once on first use so that a build needs none of them. */
const settings = z.object({
	HAIRSBREADTH_DATABASE_URL: z
		.string({ error: 'HAIRSBREADTH_DATABASE_URL is missing: npm start sets it, a deployment must' })
		.regex(/^postgres(ql)?:\/\//, 'HAIRSBREADTH_DATABASE_URL must be a postgres:// address')
});

export interface Config {
	databaseUrl: string;
}

let current: Config | undefined;

export function config(): Config {
	if (!current) {
		const parsed = settings.safeParse(process.env);
		if (!parsed.success) throw new Error(z.prettifyError(parsed.error));
		current = { databaseUrl: parsed.data.HAIRSBREADTH_DATABASE_URL };
	}
	return current;
}
