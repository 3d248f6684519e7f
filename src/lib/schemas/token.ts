import { z } from 'zod';

/** What a personal token may be used for. The role of its owner still decides what that amounts to. */
export const SCOPES = ['read', 'compute', 'upload', 'review'] as const;

export const scope = z.enum(SCOPES, { error: `a scope is one of ${SCOPES.join(', ')}` });
export type Scope = z.infer<typeof scope>;

export const TOKEN_DAYS_MAX = 365;

export const newToken = z
	.strictObject({
		name: z
			.string({ error: 'say what the token is for' })
			.trim()
			.min(1, 'say what the token is for')
			.max(80, 'at most 80 characters')
			.regex(/^[^\p{Cc}]*$/u, 'no control characters'),
		scopes: z.array(scope).min(1, 'choose at least one scope').max(SCOPES.length),
		days: z.coerce
			.number({ error: `a number of days from 1 to ${TOKEN_DAYS_MAX}` })
			.int('a whole number of days')
			.min(1, 'at least one day')
			.max(TOKEN_DAYS_MAX, 'a year at most')
	})
	.meta({ id: 'NewToken' });
export type NewToken = z.infer<typeof newToken>;

export const tokenSummary = z
	.object({
		id: z.uuid(),
		name: z.string(),
		/** The first characters, so that the owner recognises it; far too few to use. */
		beginning: z.string(),
		scopes: z.array(scope),
		createdAt: z.iso.datetime(),
		expiresAt: z.iso.datetime(),
		lastUsedAt: z.iso.datetime().nullable(),
		revokedAt: z.iso.datetime().nullable()
	})
	.meta({ id: 'Token' });
export type TokenSummary = z.infer<typeof tokenSummary>;
