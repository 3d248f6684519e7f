import { and, count, desc, eq, isNull, lt } from 'drizzle-orm';
import { z } from 'zod';
import type { SignedIn } from '../../schemas/person.ts';
import { decodeCursor, page } from '../api/paginate.ts';
import { now } from '../clock.ts';
import { database } from '../db/client.ts';
import { notification } from '../db/schema/curation.ts';
import { words } from './words.ts';

/** What somebody was told inside the application, newest first. */

export interface Told {
	id: number;
	subject: string;
	paragraphs: string[];
	link: { text: string; href: string };
	at: string;
	read: boolean;
}

const PAGE = 50;

export async function list(actor: SignedIn, cursor?: string): Promise<{ told: Told[]; next: string | null }> {
	const before = cursor === undefined ? undefined : decodeCursor(cursor, z.int());
	const rows = await database()
		.select()
		.from(notification)
		.where(
			and(eq(notification.personId, actor.id), before === undefined ? undefined : lt(notification.id, before))
		)
		.orderBy(desc(notification.id))
		.limit(PAGE + 1);
	const shown = page(rows, PAGE, ({ id }) => id);
	return {
		told: shown.rows.map(({ id, kind, data, createdAt, readAt }) => ({
			id,
			...words(kind, data),
			at: createdAt.toISOString(),
			read: readAt !== null
		})),
		next: shown.next
	};
}

export async function unread(personId: string): Promise<number> {
	const [{ total }] = await database()
		.select({ total: count() })
		.from(notification)
		.where(and(eq(notification.personId, personId), isNull(notification.readAt)));
	return total;
}

/** One, or everything that is unread. Another person's stays untouched. */
export async function markRead(actor: SignedIn, id?: number): Promise<void> {
	await database()
		.update(notification)
		.set({ readAt: now() })
		.where(
			and(
				eq(notification.personId, actor.id),
				isNull(notification.readAt),
				id === undefined ? undefined : eq(notification.id, id)
			)
		);
}
