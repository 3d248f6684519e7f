import { sweep } from '../auth/sessions.ts';
import { authSettings } from '../auth/settings.ts';
import { closeDemo, seedDemo } from '../demo/seed.ts';
import { closeDemoMailbox, demoMailbox } from '../demo/mailbox.ts';
import { log } from '../log.ts';
import { smtpTransport } from '../mail/transport.ts';
import { startDelivery, type DeliveryLoop } from '../outbox/loop.ts';
import { ensureAdministrator } from './bootstrap.ts';

const SWEEP_EVERY_MS = 3_600_000;

let delivery: DeliveryLoop | undefined;
let sweeping: NodeJS.Timeout | undefined;

/**
 * Makes ready what people need of a process that serves them: accounts to begin with, and the delivery of mail.
 *
 * @throws Error that says what to put right, before anybody is served
 */
export async function startPeople(): Promise<void> {
	const settings = authSettings();
	if (settings.demo) await seedDemo();
	else await leaveDemo(settings.administrator);
	const url = settings.smtpUrl ?? (settings.demo ? (await demoMailbox()).url : undefined);
	if (url) delivery = startDelivery(smtpTransport(url, settings.mailFrom));
	else log().warn('HAIRSBREADTH_SMTP_URL is unset: mails are written but wait.');
	sweeping = setInterval(() => {
		sweep().catch((error: unknown) =>
			log().warn({ error: error instanceof Error ? error.name : 'unknown' }, 'sessions could not be swept')
		);
	}, SWEEP_EVERY_MS);
	sweeping.unref();
}

async function leaveDemo(administrator: string | undefined): Promise<void> {
	const administered = await ensureAdministrator(administrator);
	if (!administered) {
		log().warn(
			'Nobody administers this installation. Set HAIRSBREADTH_ADMINISTRATOR to your e-mail address.'
		);
		return;
	}
	await closeDemo();
}

export async function stopPeople(): Promise<void> {
	clearInterval(sweeping);
	await delivery?.stop();
	delivery = undefined;
	await closeDemoMailbox();
}
