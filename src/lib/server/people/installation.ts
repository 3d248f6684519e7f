import { eq } from 'drizzle-orm';
import { z } from 'zod';
import type { SignedIn } from '../../schemas/person.ts';
import { appendAudit } from '../audit/append.ts';
import { now } from '../clock.ts';
import { database } from '../db/client.ts';
import { setting } from '../db/schema/setting.ts';
import { requireAdministrator } from './rights.ts';

/** What an administrator decides for everybody. */

export const installationSettings = z.strictObject({
	/** Whether signed-out visitors may read the library and compute. */
	publicReading: z.boolean()
});
export type InstallationSettings = z.infer<typeof installationSettings>;

const BY_DEFAULT: InstallationSettings = { publicReading: true };
const KEY = 'installation';
/** Every request of a visitor asks; a change counts everywhere after this at the latest. */
const REMEMBERED_MS = 2000;

let remembered: { at: number; value: InstallationSettings } | undefined;

export async function read(): Promise<InstallationSettings> {
	const at = performance.now();
	if (remembered && at - remembered.at < REMEMBERED_MS) return remembered.value;
	const [row] = await database().select({ value: setting.value }).from(setting).where(eq(setting.key, KEY));
	const value = installationSettings.parse({ ...BY_DEFAULT, ...(row?.value as object | undefined) });
	remembered = { at, value };
	return value;
}

export async function change(actor: SignedIn, value: InstallationSettings): Promise<void> {
	requireAdministrator(actor);
	const before = await read();
	await database().transaction(async (tx) => {
		await tx
			.insert(setting)
			.values({ key: KEY, value, updatedAt: now(), updatedBy: actor.id })
			.onConflictDoUpdate({
				target: setting.key,
				set: { value, updatedAt: now(), updatedBy: actor.id }
			});
		await appendAudit(tx, {
			actor: actor.id,
			action: 'setting.change',
			objectType: 'setting',
			objectId: KEY,
			details: { from: before, to: value }
		});
	});
	remembered = undefined;
}
