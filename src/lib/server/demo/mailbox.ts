import { createRequire } from 'node:module';
import type { AddressInfo } from 'node:net';
import { resolve as resolvePath } from 'node:path';

/** A mail server that delivers to a page: in demo mode nothing leaves the machine. */

export interface CaughtMail {
	id: number;
	at: string;
	to: string;
	subject: string;
	text: string;
	html: string;
}

export interface Mailbox {
	url: string;
	/** Newest first. */
	mails: () => CaughtMail[];
	close: () => Promise<void>;
}

const KEPT = 200;
const SIZE_MAX = 1_000_000;

/** Needed by demo mode alone, so they are no part of the application that is built: looked up when it is on. */
const here = createRequire(resolvePath('package.json'));

/** Listens on a free port of the loopback address. */
export async function openMailbox(): Promise<Mailbox> {
	const { SMTPServer } = here('smtp-server') as typeof import('smtp-server');
	const { simpleParser } = here('mailparser') as typeof import('mailparser');
	const caught: CaughtMail[] = [];
	let count = 0;
	const server = new SMTPServer({
		disabledCommands: ['AUTH', 'STARTTLS'],
		size: SIZE_MAX,
		logger: false,
		onData: (stream, session, done) => {
			simpleParser(stream).then((mail) => {
				count += 1;
				caught.unshift({
					id: count,
					at: new Date().toISOString(),
					to: session.envelope.rcptTo.map(({ address }) => address).join(', '),
					subject: mail.subject ?? '',
					text: mail.text ?? '',
					html: typeof mail.html === 'string' ? mail.html : ''
				});
				caught.length = Math.min(caught.length, KEPT);
				done();
			}, done);
		}
	});
	await new Promise<void>((resolve, reject) => {
		server.once('error', reject);
		server.listen(0, '127.0.0.1', resolve);
	});
	const { port } = server.server.address() as AddressInfo;
	return {
		url: `smtp://127.0.0.1:${port}`,
		mails: () => [...caught],
		close: () => new Promise((resolve) => server.close(() => resolve()))
	};
}

let shared: Promise<Mailbox> | undefined;

/** The one of this process, opened on first use. */
export function demoMailbox(): Promise<Mailbox> {
	shared ??= openMailbox();
	return shared;
}

export async function closeDemoMailbox(): Promise<void> {
	const open = shared;
	shared = undefined;
	await (await open)?.close();
}
