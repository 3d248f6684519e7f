import { afterEach, beforeAll, describe, expect, it, vi } from 'vitest';
import type { SignedIn } from '../../src/lib/schemas/person.ts';
import { decodeStudy } from '../../src/lib/schemas/study-address.ts';
import { Conflict, Forbidden, InvalidInput, NotFound, StateError } from '../../src/lib/server/errors.ts';
import { list as told } from '../../src/lib/server/notifications/list.ts';
import * as defaults from '../../src/lib/server/studies/group-defaults.ts';
import * as links from '../../src/lib/server/studies/links.ts';
import * as studies from '../../src/lib/server/studies/studies.ts';
import { heirs, transfer } from '../../src/lib/server/studies/transfer.ts';
import { WORKED_ARRANGEMENTS } from '../../src/lib/schemas/worked-arrangements.ts';
import { demoPeople } from '../support/curators.ts';
import { useDatabase } from '../support/database.ts';

/** Studies that others are let to: by a link, for good, and begun with what a group agreed on. */

const database = useDatabase();
let people: Record<string, SignedIn>;

beforeAll(async () => {
	people = await demoPeople();
});
afterEach(() => vi.useRealTimers());

const study = (actor: SignedIn, over: Partial<Parameters<typeof studies.create>[1]> = {}) =>
	studies.create(actor, {
		name: 'A gap',
		query: '?left=gold-drude@1.0&medium=vacuum@1.0&right=gold-drude@1.0&choice=One&at=50',
		notes: '',
		reasons: [],
		visibility: 'private',
		group: null,
		...over
	});

describe('a link', () => {
	it('lets anybody read until it runs out or is taken back, and nobody else', async () => {
		const { researcher } = people;
		const { id } = await study(researcher);
		const secret = await links.create(researcher, id, 2);
		expect((await links.open(secret)).study.id).toBe(id);
		await studies.change(researcher, id, { revision: 1, notes: 'Later' });
		expect((await links.open(secret)).study.notes).toBe('Later');
		await expect(
			links.open(`${secret.slice(0, -1)}${secret.endsWith('A') ? 'B' : 'A'}`)
		).rejects.toBeInstanceOf(NotFound);

		const [{ id: link, state }] = await links.list(researcher, id);
		expect(state).toBe('open');
		await links.revoke(researcher, id, link);
		await expect(links.open(secret)).rejects.toBeInstanceOf(NotFound);
		expect((await links.list(researcher, id))[0].state).toBe('taken back');

		const second = await links.create(researcher, id, 2);
		vi.useFakeTimers({ now: Date.now() + 2 * 24 * 3_600_000 + 1000, toFake: ['Date'] });
		await expect(links.open(second)).rejects.toBeInstanceOf(NotFound);
	});

	it('is for the owner to make, and keeps no secret', async () => {
		const { researcher, reader, lead } = people;
		const open = await study(researcher, { visibility: 'group', group: 'cantilevers' });
		await expect(links.create(lead, open.id, 3)).rejects.toBeInstanceOf(Forbidden);
		await expect(links.list(lead, open.id)).rejects.toBeInstanceOf(Forbidden);
		await expect(links.create(reader, open.id, 3)).rejects.toBeInstanceOf(NotFound);
		const secret = await links.create(researcher, open.id, 3);
		const [row] = await database.sql`select * from study_link where study_id = ${open.id}`;
		expect(JSON.stringify(row)).not.toContain(secret);
		await expect(
			database.applicationSql`update study_link set expires_at = now() + interval '9 years' where id = ${row.id}`
		).rejects.toMatchObject({ constraint_name: 'study_link_permanent' });
		await expect(database.applicationSql`delete from study_link where id = ${row.id}`).rejects.toMatchObject({
			constraint_name: 'study_link_permanent'
		});
	});

	it('is one of twenty at most', async () => {
		const { researcher } = people;
		const { id } = await study(researcher);
		for (let made = 0; made < 20; made += 1) await links.create(researcher, id, 1);
		await expect(links.create(researcher, id, 1)).rejects.toBeInstanceOf(StateError);
	});
});

describe('giving a study away', () => {
	it('makes somebody of one’s groups its owner, who is told', async () => {
		const { researcher, lead, 'researcher-2': stranger } = people;
		const { id } = await study(researcher, { name: 'A gift', visibility: 'group', group: 'cantilevers' });
		const names = (await heirs(researcher)).map(({ name }) => name);
		expect(names).toContain('Larkmoor lead');
		expect(names).not.toContain('Larkmoor researcher 2');
		await expect(transfer(researcher, id, { to: stranger.id, revision: 1 })).rejects.toBeInstanceOf(
			InvalidInput
		);
		await expect(transfer(lead, id, { to: lead.id, revision: 1 })).rejects.toBeInstanceOf(Forbidden);
		await expect(transfer(researcher, id, { to: lead.id, revision: 2 })).rejects.toBeInstanceOf(Conflict);
		await transfer(researcher, id, { to: lead.id, revision: 1 });
		expect(await studies.get(lead, id)).toMatchObject({
			own: true,
			study: { owner: 'Larkmoor lead', revision: 2 }
		});
		expect((await studies.get(researcher, id)).own).toBe(false);
		expect((await told(lead)).told[0].subject).toBe('Larkmoor researcher gave you the study "A gift"');
		expect(await studies.history(lead, id)).toHaveLength(2);
	});
});

describe('what a group begins with', () => {
	const wanted = { conduction: 'plasma', gold: 'gold-johnson-christy@1.0', temperatureK: 295 } as const;

	it('is agreed on by its leads, and known to its members alone', async () => {
		const { lead, researcher, 'researcher-2': stranger } = people;
		await expect(defaults.set(researcher, 'cantilevers', wanted)).rejects.toBeInstanceOf(Forbidden);
		await expect(defaults.set(stranger, 'cantilevers', wanted)).rejects.toBeInstanceOf(NotFound);
		await expect(
			defaults.set(lead, 'cantilevers', { ...wanted, gold: 'silica-two-oscillators@1.0' })
		).rejects.toBeInstanceOf(InvalidInput);
		expect(await defaults.of(researcher, 'cantilevers')).toBeNull();
		await defaults.set(lead, 'cantilevers', wanted);
		await defaults.set(lead, 'cantilevers', { ...wanted, temperatureK: 293 });
		expect(await defaults.of(researcher, 'cantilevers')).toEqual({ ...wanted, temperatureK: 293 });
		expect(await defaults.of(stranger, 'cantilevers')).toBeNull();
		await expect(database.applicationSql`update group_default set temperature_k = 4`).rejects.toMatchObject({
			constraint_name: 'group_default_change_audited'
		});
	});

	it('stands in a new study, whose conductors all have a stated rule', async () => {
		const { lead, researcher } = people;
		await defaults.set(lead, 'cantilevers', wanted);
		const film = WORKED_ARRANGEMENTS.findIndex(({ name }) => name === 'A gold film on silica');
		const made = await defaults.begin(researcher, {
			...{ name: '', begin: film, group: 'cantilevers', conduction: 'drude', temperatureK: 295 }
		});
		const { study: begun } = decodeStudy(new URLSearchParams(made.query));
		expect(made).toMatchObject({ name: 'A gold film on silica', group: { slug: 'cantilevers' } });
		expect(begun.temperatureK).toBe(295);
		const stated = { version: 'gold-johnson-christy@1.0', zeroFrequency: 'drude' };
		expect(begun.left.layers[0].of).toEqual(stated);
		expect(begun.right.substrate).toEqual(stated);
		expect(begun.left.substrate.zeroFrequency).toBeUndefined();
	});

	it('leaves the question open where nobody answered it, until somebody does', async () => {
		const { researcher } = people;
		const { id } = await study(researcher);
		await defaults.decide(researcher, id, { revision: 1, conduction: 'plasma' });
		const { study: kept } = await studies.get(researcher, id);
		expect(kept.query).toContain('left=gold-drude@1.0!plasma');
		expect(kept.query).toContain('right=gold-drude@1.0!plasma');
		await expect(
			defaults.decide(researcher, id, { revision: 1, conduction: 'drude' })
		).rejects.toBeInstanceOf(Conflict);
	});
});
