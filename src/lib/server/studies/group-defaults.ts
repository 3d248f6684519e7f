import { eq } from 'drizzle-orm';
import { epsilonShares } from '../../engine/index.ts';
import type { GroupDefaults, NewFromArrangement } from '../../schemas/group-defaults.ts';
import type { SignedIn } from '../../schemas/person.ts';
import type { SavedStudy } from '../../schemas/saved-study.ts';
import { decodeStudy } from '../../schemas/study-address.ts';
import { encodeStudy } from '../../schemas/study-encode.ts';
import { versionsOf } from '../../schemas/study-slots.ts';
import type { Study } from '../../schemas/study.ts';
import { WORKED_ARRANGEMENTS } from '../../schemas/worked-arrangements.ts';
import { withConduction, withGold } from '../../study-sheet/group-defaults.ts';
import { appendAudit } from '../audit/append.ts';
import { now } from '../clock.ts';
import { database } from '../db/client.ts';
import { group, groupDefault } from '../db/schema/group.ts';
import { InvalidInput } from '../errors.ts';
import { factsOf } from '../library/facts-of.ts';
import * as versions from '../library/versions.ts';
import * as groups from '../people/groups.ts';
import { requireManagesGroup } from '../people/rights.ts';
import * as studies from './studies.ts';

/** What the new studies of a group begin with: agreed on by its leads, never assumed. */

/** Null where the group has agreed on nothing, or is none that the caller is in. */
export async function of(actor: SignedIn, slug: string): Promise<GroupDefaults | null> {
	if (!actor.groups.some((one) => one.slug === slug)) return null;
	const [row] = await database()
		.select({ row: groupDefault })
		.from(groupDefault)
		.innerJoin(group, eq(group.id, groupDefault.groupId))
		.where(eq(group.slug, slug));
	if (!row) return null;
	const { conduction, gold, temperatureK } = row.row;
	return { conduction: conduction === 'plasma' ? 'plasma' : 'drude', gold, temperatureK };
}

/** @throws InvalidInput where the version is none of gold, or is not published */
export async function set(actor: SignedIn, slug: string, wanted: GroupDefaults): Promise<void> {
	const { id } = await groups.get(actor, slug);
	requireManagesGroup(actor, id);
	if (wanted.gold !== null) {
		const found = (await versions.resolve([wanted.gold])).get(wanted.gold);
		if (found?.state !== 'published' || found.material.slug !== 'gold')
			throw new InvalidInput('That is no version of gold.', [
				{ path: 'gold', message: 'the name of a published version of gold, as gold-drude@1.0, or nothing' }
			]);
	}
	const row = { groupId: id, ...wanted, changedAt: now(), changedBy: actor.id };
	await database().transaction(async (tx) => {
		await tx.insert(groupDefault).values(row).onConflictDoUpdate({ target: groupDefault.groupId, set: row });
		await appendAudit(tx, {
			actor: actor.id,
			action: 'group.defaults',
			objectType: 'group',
			objectId: id,
			details: { ...wanted }
		});
	});
}

async function factsFor(study: Study, ...more: (string | null)[]) {
	const resolved = await versions.resolve([...versionsOf(study), ...more.filter((one) => one !== null)]);
	return Object.fromEntries([...resolved].map(([ref, one]) => [ref, factsOf(one, epsilonShares)]));
}

/** A study that begins with a worked arrangement, at the temperature and by the rule that were stated. */
export async function begin(actor: SignedIn, wanted: NewFromArrangement): Promise<SavedStudy> {
	const start = WORKED_ARRANGEMENTS[wanted.begin];
	if (!start)
		throw new InvalidInput('Choose an arrangement to begin with.', [
			{ path: 'begin', message: 'one of the list' }
		]);
	const slug = wanted.group === '' ? null : wanted.group;
	const defaults = slug === null ? null : await of(actor, slug);
	const { study } = decodeStudy(new URLSearchParams(start.query));
	const gold = defaults?.gold ?? null;
	const facts = await factsFor(study, gold);
	const made = withConduction(withGold(study, gold, facts), wanted.conduction, facts);
	return studies.create(actor, {
		name: wanted.name === '' ? start.name : wanted.name,
		query: encodeStudy({ ...made, temperatureK: wanted.temperatureK }),
		notes: '',
		reasons: [],
		visibility: 'private',
		group: slug
	});
}

/** Answers the question that a study asks while its conductors have no stated rule. */
export async function decide(
	actor: SignedIn,
	id: string,
	{ revision, conduction }: { revision: number; conduction: GroupDefaults['conduction'] }
): Promise<void> {
	const { study: saved } = await studies.get(actor, id);
	const { study } = decodeStudy(new URLSearchParams(saved.query));
	await studies.change(actor, id, {
		revision,
		query: encodeStudy(withConduction(study, conduction, await factsFor(study)))
	});
}
