import { afterEach, beforeAll, describe, expect, it } from 'vitest';
import { useDatabase } from '../support/database.ts';
import { openTestMail, type TestMail } from '../support/mail.ts';

/** Mail goes out if and only if its cause was committed, once, sooner or later. */

const database = useDatabase();
let services: {
	db: typeof import('../../src/lib/server/db/client.ts');
	enqueue: typeof import('../../src/lib/server/outbox/enqueue.ts').enqueue;
	deliver: typeof import('../../src/lib/server/outbox/deliver.ts');
	transport: typeof import('../../src/lib/server/mail/transport.ts').smtpTransport;
	clock: typeof import('../../src/lib/server/clock.ts');
};
let mail: TestMail;

beforeAll(async () => {
	process.env.HAIRSBREADTH_SECRET = Buffer.alloc(32, 7).toString('base64');
	services = {
		db: await import('../../src/lib/server/db/client.ts'),
		enqueue: (await import('../../src/lib/server/outbox/enqueue.ts')).enqueue,
		deliver: await import('../../src/lib/server/outbox/deliver.ts'),
		transport: (await import('../../src/lib/server/mail/transport.ts')).smtpTransport,
		clock: await import('../../src/lib/server/clock.ts')
	};
	mail = await openTestMail();
	return () => mail.close();
});
afterEach(() => services.clock.setClock());

const open = () => services.transport(mail.url, 'gaps@larkmoor.example');
const write = (to: string, more: object = {}) =>
	services.db
		.database()
		.transaction((tx) => services.enqueue(tx, { letter: { kind: 'sign-in-link' }, to, ...more }));

async function drain(): Promise<string[]> {
	const transport = open();
	const outcomes: string[] = [];
	for (;;) {
		const outcome = await services.deliver.deliverOne(transport);
		if (outcome === 'nothing-due') break;
		outcomes.push(outcome);
	}
	transport.close();
	return outcomes;
}

describe('the outbox', () => {
	it('sends as text and as HTML, and forgets the secret', async () => {
		const secretLink = 'http://localhost/sign-in/confirm?link=SECRET-PART';
		await write('one@larkmoor.example', { secretLink });
		const [waiting] = await database.sql`select one::text as row from outbox as one`;
		expect(waiting.row).not.toContain('SECRET-PART');
		expect(await drain()).toEqual(['sent']);
		const received = mail.to('one@larkmoor.example')[0];
		expect(received.text).toContain(secretLink);
		expect(received.html).toContain(secretLink);
		const [sent] = await database.sql`select state, sealed, attempts from outbox`;
		expect(sent).toEqual({ state: 'sent', sealed: null, attempts: 1 });
	});

	it('sends nothing of a transaction that was taken back', async () => {
		await expect(
			services.db.database().transaction(async (tx) => {
				await services.enqueue(tx, { letter: { kind: 'account-removed' }, to: 'undone@larkmoor.example' });
				throw new Error('taken back');
			})
		).rejects.toThrow('taken back');
		expect(await drain()).toEqual([]);
		expect(mail.to('undone@larkmoor.example')).toEqual([]);
	});

	it('sends each mail once, however many processes send', async () => {
		for (let index = 0; index < 30; index += 1) await write(`many-${index}@larkmoor.example`);
		const outcomes = await Promise.all(Array.from({ length: 4 }, () => drain()));
		expect(outcomes.flat().filter((outcome) => outcome === 'sent')).toHaveLength(30);
		for (let index = 0; index < 30; index += 1) {
			expect(mail.to(`many-${index}@larkmoor.example`)).toHaveLength(1);
		}
	});

	it('tries again later and later, and gives up in the end', async () => {
		await write('patient@larkmoor.example', { secretLink: 'http://localhost/x' });
		const closed = services.transport('smtp://127.0.0.1:9', 'gaps@larkmoor.example');
		let at = Date.now();
		services.clock.setClock(() => new Date(at));
		expect(await services.deliver.deliverOne(closed)).toBe('later');
		expect(await services.deliver.deliverOne(closed)).toBe('nothing-due');
		const waits: number[] = [];
		for (;;) {
			const [{ next }] = await database.sql`select next_attempt_at as next from outbox
				where recipient = 'patient@larkmoor.example'`;
			waits.push(new Date(next).getTime() - at);
			at = new Date(next).getTime();
			if ((await services.deliver.deliverOne(closed)) === 'given-up') break;
		}
		expect(waits.slice(0, 4)).toEqual([10_000, 20_000, 40_000, 80_000]);
		expect(Math.max(...waits)).toBeLessThanOrEqual(6 * 3_600_000);
		const [row] = await database.sql`select state, sealed, last_error is not null as told from outbox
			where recipient = 'patient@larkmoor.example'`;
		expect(row).toEqual({ state: 'failed', sealed: null, told: true });
		closed.close();
	});

	it('does not send what is of no use any more', async () => {
		await write('late@larkmoor.example', { uselessAfter: new Date(Date.now() - 1) });
		expect(await drain()).toEqual(['given-up']);
		expect(mail.to('late@larkmoor.example')).toEqual([]);
	});
});
