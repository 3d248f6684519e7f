import { newScreening } from '../../src/lib/schemas/screening.ts';
import { closeDatabase, database } from '../../src/lib/server/db/client.ts';
import { screening } from '../../src/lib/server/db/schema/screening.ts';
import { planScreening } from '../../src/lib/server/screening/plan.ts';
import * as screenings from '../../src/lib/server/screening/screenings.ts';
import { demoPeople } from '../support/curators.ts';

/** States 40 solids x 40 solids x 10 liquids at 5 separations, one version each, for the workers that are timed. */

const separationsNm = [20, 50, 100, 200, 500];
const asked = {
	left: { class: 'solid' },
	medium: { class: 'liquid' },
	separationsNm,
	criterion: { kind: 'repulsive' }
};
const { researcher } = await demoPeople();
const everything = newScreening.parse({ name: 'Bench', statement: asked });
const plan = await planScreening(everything.statement);
const refs = (parts: { of: number }[], count: number) =>
	parts.slice(0, count).map(({ of }) => plan.materials[of].ref);
const made = await screenings.create(
	researcher,
	newScreening.parse({
		name: 'Bench',
		statement: {
			...asked,
			left: { versions: refs(plan.left, 40) },
			medium: { versions: refs(plan.media, 10) }
		}
	})
);
const stored = await database().select({ cells: screening.cells }).from(screening);
console.log(made.cells, stored.length);
await closeDatabase();
