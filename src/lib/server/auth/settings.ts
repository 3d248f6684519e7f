import { z } from 'zod';
import { role, type Role } from '../../schemas/person.ts';
import { demoSecret } from './demo-secret.ts';

/**
 * Settings of sign-in and mail from the environment. Each wrong one is named in a sentence, and what production needs is
 * refused at the start rather than missed at the first sign-in.
 */

/** Hosts that only this machine can reach. */
const LOOPBACK = /^(127(\.\d{1,3}){3}|::1|localhost)$/;
const SECRET_BYTES_LEAST = 32;

const roleMap = z
	.string()
	.transform((text, context) => {
		try {
			return JSON.parse(text) as unknown;
		} catch {
			context.addIssue({
				code: 'custom',
				message: 'HAIRSBREADTH_OIDC_ROLES must be JSON, as {"gap-curators":"curator"}'
			});
			return z.NEVER;
		}
	})
	.pipe(
		z.record(z.string().min(1), role, {
			error: 'HAIRSBREADTH_OIDC_ROLES must map names of groups to roles, as {"gap-curators":"curator"}'
		})
	);

const environmentShape = z.object({
	ORIGIN: z
		.url({ protocol: /^https?$/, error: 'ORIGIN must be the public address, as https://gaps.example.org' })
		.optional(),
	HOST: z.string().optional(),
	HAIRSBREADTH_SECRET: z.string().optional(),
	HAIRSBREADTH_DEMO: z.enum(['0', '1'], { error: 'HAIRSBREADTH_DEMO must be 0 or 1' }).optional(),
	HAIRSBREADTH_DEMO_OPEN: z
		.literal('anyone-may-sign-in-as-anyone', {
			error: 'HAIRSBREADTH_DEMO_OPEN must read anyone-may-sign-in-as-anyone'
		})
		.optional(),
	HAIRSBREADTH_SMTP_URL: z
		.string()
		.regex(/^smtps?:\/\//, 'HAIRSBREADTH_SMTP_URL must be an smtp:// or smtps:// address')
		.optional(),
	HAIRSBREADTH_MAIL_FROM: z
		.email('HAIRSBREADTH_MAIL_FROM must be an e-mail address')
		.default('hairsbreadth@localhost.example'),
	HAIRSBREADTH_ADMINISTRATOR: z.email('HAIRSBREADTH_ADMINISTRATOR must be an e-mail address').optional(),
	HAIRSBREADTH_OIDC_ISSUER: z.url('HAIRSBREADTH_OIDC_ISSUER must be an address').optional(),
	HAIRSBREADTH_OIDC_CLIENT_ID: z.string().min(1).optional(),
	HAIRSBREADTH_OIDC_CLIENT_SECRET: z.string().min(1).optional(),
	HAIRSBREADTH_OIDC_NAME: z.string().min(1).max(60).default('your institution'),
	HAIRSBREADTH_OIDC_GROUPS_CLAIM: z.string().min(1).default('groups'),
	HAIRSBREADTH_OIDC_SCOPES: z
		.string()
		.regex(/^openid( |$)/, 'HAIRSBREADTH_OIDC_SCOPES must begin with openid')
		.default('openid email profile'),
	HAIRSBREADTH_OIDC_ROLES: roleMap.optional()
});

export interface OpenIdSettings {
	issuer: string;
	clientId: string;
	clientSecret: string;
	/** What the button calls it. */
	name: string;
	groupsClaim: string;
	scopes: string;
	/** The allow-list: who is in none of these groups is not let in. */
	roles: Record<string, Role>;
}

export interface AuthSettings {
	origin: string;
	secure: boolean;
	demo: boolean;
	secret: Buffer;
	smtpUrl?: string;
	mailFrom: string;
	/** Becomes the first administrator where there is none yet. */
	administrator?: string;
	openId?: OpenIdSettings;
}

let current: AuthSettings | undefined;

export function authSettings(): AuthSettings {
	current ??= readAuthSettings(process.env);
	return current;
}

/** @throws Error that says in a sentence each thing that is missing or wrong */
export function readAuthSettings(environment: NodeJS.ProcessEnv): AuthSettings {
	const parsed = environmentShape.safeParse(environment);
	if (!parsed.success) throw new Error(z.prettifyError(parsed.error));
	const found = parsed.data;
	const demo = found.HAIRSBREADTH_DEMO === '1';
	const production = environment.NODE_ENV === 'production' && !demo;
	const wrong: string[] = [];

	if (demo && !LOOPBACK.test(found.HOST ?? '') && !found.HAIRSBREADTH_DEMO_OPEN) {
		wrong.push(
			'Demo mode lets anybody in as anybody, so it runs on 127.0.0.1 only. Set HAIRSBREADTH_DEMO=0, or HOST=127.0.0.1, ' +
				'or say it twice with HAIRSBREADTH_DEMO_OPEN=anyone-may-sign-in-as-anyone.'
		);
	}
	if (production && !found.ORIGIN) wrong.push('ORIGIN is unset: links in mails need the public address.');
	if (production && !found.HAIRSBREADTH_SMTP_URL) {
		wrong.push('HAIRSBREADTH_SMTP_URL is unset: without mail nobody can sign in.');
	}
	const secret = secretOf(found.HAIRSBREADTH_SECRET, demo, production, wrong);
	const openId = openIdOf(found, wrong);
	if (wrong.length > 0) throw new Error(wrong.join('\n'));

	const origin = (found.ORIGIN ?? 'http://localhost:5173').replace(/\/$/, '');
	return {
		origin,
		secure: origin.startsWith('https://'),
		demo,
		secret,
		smtpUrl: found.HAIRSBREADTH_SMTP_URL,
		mailFrom: found.HAIRSBREADTH_MAIL_FROM,
		administrator: found.HAIRSBREADTH_ADMINISTRATOR?.toLowerCase(),
		openId
	};
}

function secretOf(text: string | undefined, demo: boolean, production: boolean, wrong: string[]): Buffer {
	if (text === undefined) {
		if (!production) return demoSecret();
		wrong.push('HAIRSBREADTH_SECRET is unset. Make one with: openssl rand -base64 32');
		return Buffer.alloc(0);
	}
	const secret = Buffer.from(text, 'base64');
	if (secret.byteLength < SECRET_BYTES_LEAST && !demo) {
		wrong.push(
			`HAIRSBREADTH_SECRET has fewer than ${SECRET_BYTES_LEAST} bytes. Make one with: openssl rand -base64 32`
		);
	}
	return secret;
}

function openIdOf(found: z.infer<typeof environmentShape>, wrong: string[]): OpenIdSettings | undefined {
	const issuer = found.HAIRSBREADTH_OIDC_ISSUER;
	if (!issuer) return undefined;
	const { protocol, hostname } = new URL(issuer);
	if (protocol !== 'https:' && !LOOPBACK.test(hostname)) {
		wrong.push('HAIRSBREADTH_OIDC_ISSUER must be an https:// address.');
	}
	const { HAIRSBREADTH_OIDC_CLIENT_ID: clientId, HAIRSBREADTH_OIDC_CLIENT_SECRET: clientSecret } = found;
	const roles = found.HAIRSBREADTH_OIDC_ROLES;
	if (!clientId || !clientSecret || !roles) {
		wrong.push(
			'HAIRSBREADTH_OIDC_ISSUER is set, so HAIRSBREADTH_OIDC_CLIENT_ID, HAIRSBREADTH_OIDC_CLIENT_SECRET and HAIRSBREADTH_OIDC_ROLES must be set too.'
		);
		return undefined;
	}
	return {
		issuer,
		clientId,
		clientSecret,
		name: found.HAIRSBREADTH_OIDC_NAME,
		groupsClaim: found.HAIRSBREADTH_OIDC_GROUPS_CLAIM,
		scopes: found.HAIRSBREADTH_OIDC_SCOPES,
		roles
	};
}
