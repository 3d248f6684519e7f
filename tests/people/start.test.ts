import { beforeAll, describe, expect, it } from 'vitest';
import { ensureBuild } from '../../src/launch/build.mjs';
import { run } from '../../src/launch/command.mjs';
import { freePort } from '../../src/launch/free-port.mjs';
import { useDatabase } from '../support/database.ts';

const database = useDatabase();
let demo: typeof import('../../src/lib/server/demo/seed.ts');
let demoToken: typeof import('../../src/lib/server/demo/token.ts').demoToken;
let ensureAdministrator: typeof import('../../src/lib/server/people/bootstrap.ts').ensureAdministrator;
let findToken: typeof import('../../src/lib/server/people/tokens.ts').find;

beforeAll(async () => {
	process.env.HAIRSBREADTH_SECRET = Buffer.alloc(32, 7).toString('base64');
	demo = await import('../../src/lib/server/demo/seed.ts');
	({ demoToken } = await import('../../src/lib/server/demo/token.ts'));
	({ ensureAdministrator } = await import('../../src/lib/server/people/bootstrap.ts'));
	({ find: findToken } = await import('../../src/lib/server/people/tokens.ts'));
});

describe('the Larkmoor Gap Laboratory', () => {
	it('is filled in once, with two of each role that a review needs', async () => {
		await demo.seedDemo();
		const count = async () => Number((await database.sql`select count(*) from audit_entry`)[0].count);
		const before = await count();
		await demo.seedDemo();
		expect(await count()).toBe(before);
		const roles =
			await database.sql`select role, count(*)::int as people from person group by role order by role`;
		expect(roles).toEqual([
			{ role: 'administrator', people: 2 },
			{ role: 'curator', people: 2 },
			{ role: 'reader', people: 2 },
			{ role: 'researcher', people: 3 }
		]);
	});

	it('gives a token for a role, and another for the second account of it', async () => {
		const [one, second] = [await demoToken('curator', false), await demoToken('curator', true)];
		expect((await findToken(one))?.person.email).toBe('curator@larkmoor.example');
		expect((await findToken(second))?.person.email).toBe('curator-2@larkmoor.example');
	});

	it('is closed when demo mode is over: no session and no token of it lives on', async () => {
		const token = await demoToken('administrator', false);
		expect(await ensureAdministrator(undefined)).toBe(false);
		expect(await ensureAdministrator('first@gaps.example')).toBe(true);
		await demo.closeDemo();
		expect(await findToken(token)).toBeNull();
		const left = await database.sql`select email from person where state = 'active'`;
		expect(left).toEqual([{ email: 'first@gaps.example' }]);
	});

	it('does not move in where people live', async () => {
		await expect(demo.seedDemo()).rejects.toThrow('this database holds accounts of people');
	});
});

describe('the start', () => {
	it.each([
		['a secret', { HAIRSBREADTH_SECRET: undefined }, 'HAIRSBREADTH_SECRET is unset'],
		['a public address', { ORIGIN: undefined }, 'ORIGIN'],
		['a mail server', { HAIRSBREADTH_SMTP_URL: undefined }, 'HAIRSBREADTH_SMTP_URL is unset'],
		['a safe place for demo mode', { HAIRSBREADTH_DEMO: '1', HOST: '0.0.0.0' }, '127.0.0.1 only'],
		['a database that survives a crash', { HAIRSBREADTH_DURABILITY: 'full' }, 'fsync'],
		['a database without people for demo mode', { HAIRSBREADTH_DEMO: '1' }, 'holds accounts of people']
	])(
		'is refused without %s, in a sentence',
		async (_what, change, sentence) => {
			const { release } = await ensureBuild();
			try {
				const port = await freePort();
				const env = {
					...process.env,
					NODE_ENV: 'production',
					HOST: '127.0.0.1',
					PORT: String(port),
					ORIGIN: `http://localhost:${port}`,
					BODY_SIZE_LIMIT: '6M',
					HAIRSBREADTH_DATABASE_URL: database.applicationUrl,
					HAIRSBREADTH_DURABILITY: 'throwaway',
					HAIRSBREADTH_SECRET: Buffer.alloc(32, 9).toString('base64'),
					HAIRSBREADTH_SMTP_URL: 'smtp://127.0.0.1:9',
					...change
				};
				const { code, output } = await run(process.execPath, ['build/index.js'], { env });
				expect(code).not.toBe(0);
				expect(output).toContain(sentence);
			} finally {
				release();
			}
		},
		120_000
	);
});
