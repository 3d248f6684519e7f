import { createTransport } from 'nodemailer';
import type { Rendered } from './render.ts';

export interface Post extends Rendered {
	to: string;
	messageId: string;
}

export interface Transport {
	send: (post: Post) => Promise<void>;
	close: () => void;
}

/** A server that does not answer must not hold up the mails behind it for long. */
const PATIENCE_MS = 10_000;

/** Speaks SMTP to the server of `url`. On loopback nothing is encrypted: there is no wire to listen on. */
export function smtpTransport(url: string, from: string): Transport {
	const { hostname } = new URL(url);
	const local = hostname === '127.0.0.1' || hostname === 'localhost';
	const mailer = createTransport(
		{
			url,
			connectionTimeout: PATIENCE_MS,
			greetingTimeout: PATIENCE_MS,
			socketTimeout: PATIENCE_MS,
			...(local ? { ignoreTLS: true } : { requireTLS: true })
		},
		{ from: { name: 'Hairsbreadth', address: from } }
	);
	return {
		send: async ({ to, subject, text, html, messageId }) => {
			await mailer.sendMail({ to: { name: '', address: to }, subject, text, html, messageId });
		},
		close: () => mailer.close()
	};
}
