import { and, desc, eq, gt, isNull } from 'drizzle-orm';
import type { SignedIn } from '../../schemas/person.ts';
import type { SavedStudy, StudyLink } from '../../schemas/saved-study.ts';
import { appendAudit } from '../audit/append.ts';
import { hashOf, newSecret } from '../auth/secrets.ts';
import { now } from '../clock.ts';
import { database } from '../db/client.ts';
import { person } from '../db/schema/people.ts';
import { study, studyLink } from '../db/schema/study.ts';
import { Forbidden, NotFound, StateError } from '../errors.ts';
import * as studies from './studies.ts';

/** Addresses by which anybody reads a study, without an account, until they run out or are taken back. */

const DAY_MS = 24 * 3_600_000;
const LIVE_MAX = 20;

const hexOf = (secret: string) => hashOf(secret).toString('hex');

async function owned(actor: SignedIn, studyId: string): Promise<void> {
	const { own } = await studies.get(actor, studyId);
	if (!own) throw new Forbidden('Who sees a study is for its owner to say.');
}

/** Newest first. The secrets are not kept, so an address is shown once, when it is made. */
export async function list(actor: SignedIn, studyId: string): Promise<StudyLink[]> {
	await owned(actor, studyId);
	const rows = await database()
		.select({ row: studyLink, by: person.name })
		.from(studyLink)
		.innerJoin(person, eq(person.id, studyLink.createdBy))
		.where(eq(studyLink.studyId, studyId))
		.orderBy(desc(studyLink.createdAt))
		.limit(100);
	const at = now();
	return rows.map(({ row, by }) => ({
		id: row.id,
		by,
		createdAt: row.createdAt.toISOString(),
		expiresAt: row.expiresAt.toISOString(),
		state: row.revokedAt ? 'taken back' : row.expiresAt <= at ? 'run out' : 'open'
	}));
}

/** @returns the secret, for the address; it is not kept */
export async function create(actor: SignedIn, studyId: string, days: number): Promise<string> {
	await owned(actor, studyId);
	const secret = newSecret();
	const at = now();
	await database().transaction(async (tx) => {
		await tx.select({ id: study.id }).from(study).where(eq(study.id, studyId)).for('update');
		const open = await tx
			.select({ id: studyLink.id })
			.from(studyLink)
			.where(and(eq(studyLink.studyId, studyId), isNull(studyLink.revokedAt), gt(studyLink.expiresAt, at)))
			.limit(LIVE_MAX);
		if (open.length === LIVE_MAX)
			throw new StateError(`This study has ${LIVE_MAX} open links. Take one back, then repeat.`);
		await tx.insert(studyLink).values({
			...{ studyId, secretHash: hexOf(secret), createdBy: actor.id, createdAt: at },
			expiresAt: new Date(at.getTime() + days * DAY_MS)
		});
		await appendAudit(tx, {
			actor: actor.id,
			action: 'study.link',
			objectType: 'study',
			objectId: studyId,
			details: { days }
		});
	});
	return secret;
}

export async function revoke(actor: SignedIn, studyId: string, linkId: string): Promise<void> {
	await owned(actor, studyId);
	const known = (await list(actor, studyId)).find(({ id }) => id === linkId);
	if (!known) throw new NotFound('There is no such link.');
	if (known.state === 'taken back') return;
	await database().transaction(async (tx) => {
		await tx.update(studyLink).set({ revokedAt: now() }).where(eq(studyLink.id, linkId));
		await appendAudit(tx, {
			actor: actor.id,
			action: 'study.unlink',
			objectType: 'study',
			objectId: studyId,
			details: { link: linkId }
		});
	});
}

/** The study behind an address. @throws NotFound alike for what never was, ran out or was taken back */
export async function open(secret: string): Promise<{ study: SavedStudy; until: string }> {
	const [found] =
		secret.length === 43
			? await database()
					.select({ studyId: studyLink.studyId, expiresAt: studyLink.expiresAt })
					.from(studyLink)
					.where(
						and(
							eq(studyLink.secretHash, hexOf(secret)),
							isNull(studyLink.revokedAt),
							gt(studyLink.expiresAt, now())
						)
					)
			: [];
	if (!found) throw new NotFound('This link leads nowhere: it has run out, was taken back, or never was.');
	return { study: await studies.read(found.studyId), until: found.expiresAt.toISOString() };
}
