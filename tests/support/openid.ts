import { createServer, type Server } from 'node:http';
import { createRequire } from 'node:module';

/** The institution: a real OpenID Connect provider on a loopback port, whose user signs in without being asked. */

export interface InstitutionAccount {
	sub: string;
	email: string;
	email_verified: boolean;
	name: string;
	groups: string[];
}

export interface Institution {
	/** Who sits in front of the provider's sign-in page. */
	becomes: (account: InstitutionAccount) => void;
	close: () => Promise<void>;
}

interface Interaction {
	interactionFinished: (request: unknown, response: unknown, result: object) => Promise<void>;
	callback: () => Parameters<typeof createServer>[1];
	Grant: new (of: { accountId: string; clientId: string }) => {
		addOIDCScope: (scope: string) => void;
		save: () => Promise<string>;
	};
	on: (event: string, listener: (...args: unknown[]) => void) => void;
}

interface GrantContext {
	oidc: {
		session?: { accountId?: string };
		client?: { clientId: string };
		provider: Interaction;
	};
}

const SCOPE = 'openid email profile groups';

export const CLIENT = { id: 'hairsbreadth', secret: 'a-secret-that-only-the-test-knows' };

export async function openInstitution(port: number, applicationOrigin: string): Promise<Institution> {
	// The package has no types of its own.
	const { Provider } = createRequire(import.meta.url)('oidc-provider') as {
		Provider: new (issuer: string, configuration: object) => Interaction;
	};
	let present: InstitutionAccount | undefined;
	const accounts = new Map<string, InstitutionAccount>();
	const issuer = `http://127.0.0.1:${port}`;
	const provider = new Provider(issuer, {
		clients: [
			{
				client_id: CLIENT.id,
				client_secret: CLIENT.secret,
				redirect_uris: [`${applicationOrigin}/auth/callback/institution`],
				grant_types: ['authorization_code'],
				response_types: ['code']
			}
		],
		scopes: SCOPE.split(' '),
		claims: { openid: ['sub'], email: ['email', 'email_verified'], profile: ['name'], groups: ['groups'] },
		conformIdTokenClaims: false,
		features: { devInteractions: { enabled: false } },
		pkce: { required: () => true },
		cookies: { keys: ['only for this test'] },
		interactions: { url: () => '/enter' },
		findAccount: (_context: unknown, id: string) => ({
			accountId: id,
			claims: () => accounts.get(id)
		}),
		loadExistingGrant: async ({ oidc }: GrantContext) => {
			const { session, client, provider: own } = oidc;
			if (!session?.accountId || !client) return undefined;
			const grant = new own.Grant({ accountId: session.accountId, clientId: client.clientId });
			grant.addOIDCScope(SCOPE);
			await grant.save();
			return grant;
		}
	});
	const callback = provider.callback();
	const server: Server = createServer((request, response) => {
		if (request.url === '/enter') {
			const login = { accountId: present?.sub ?? '' };
			provider.interactionFinished(request, response, { login }).catch((error: unknown) => {
				response.statusCode = 500;
				response.end(String(error));
			});
			return;
		}
		callback?.(request, response);
	});
	await new Promise<void>((resolve) => server.listen(port, '127.0.0.1', resolve));
	return {
		becomes: (account) => {
			accounts.set(account.sub, account);
			present = account;
		},
		close: () =>
			new Promise((resolve) => {
				server.close(() => resolve());
				server.closeAllConnections();
			})
	};
}
