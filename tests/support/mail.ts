import { openMailbox, type CaughtMail, type Mailbox } from '../../src/lib/server/demo/mailbox.ts';

/** A real mail server on a loopback port; a test waits for what was sent to its own address. */

export interface TestMail extends Mailbox {
	/** The newest mail to an address, once there are that many. */
	waitFor: (to: string, count?: number) => Promise<CaughtMail>;
	to: (address: string) => CaughtMail[];
}

const PATIENCE_MS = 10_000;

export async function openTestMail(): Promise<TestMail> {
	const mailbox = await openMailbox();
	const to = (address: string) => mailbox.mails().filter((mail) => mail.to === address);
	return {
		...mailbox,
		to,
		waitFor: async (address, count = 1) => {
			const deadline = Date.now() + PATIENCE_MS;
			while (to(address).length < count) {
				if (Date.now() > deadline)
					throw new Error(`${count} mails to ${address} did not come; ${to(address).length} did.`);
				await new Promise((resolve) => setTimeout(resolve, 25));
			}
			return to(address)[0];
		}
	};
}

/** The one link that a mail asks its reader to follow. */
export function linkIn(mail: CaughtMail): string {
	const found = /https?:\/\/\S+\?(?:link|code)=\S+/.exec(mail.text)?.[0];
	if (!found) throw new Error(`No link in: ${mail.text}`);
	return found;
}
