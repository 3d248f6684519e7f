import { randomBytes } from 'node:crypto';
import { openTestMail, type TestMail } from './mail.ts';
import { startTestServer, type TestServer } from './server.ts';

/** The built application in demo mode with a mail server of the test's own; told which header names the client. */
export async function startPeopleServer(
	environment: Record<string, string> = {}
): Promise<TestServer & { mail: TestMail }> {
	const mail = await openTestMail();
	try {
		const server = await startTestServer({
			ADDRESS_HEADER: 'x-test-client',
			HAIRSBREADTH_SECRET: randomBytes(32).toString('base64'),
			HAIRSBREADTH_SMTP_URL: mail.url,
			HAIRSBREADTH_MAIL_FROM: 'gaps@larkmoor.example',
			...environment
		});
		return {
			...server,
			mail,
			stop: async () => {
				await server.stop();
				await mail.close();
			}
		};
	} catch (error) {
		await mail.close();
		throw error;
	}
}
