import { inArray, sql, type SQL } from 'drizzle-orm';
import type { PgColumn, PgTable } from 'drizzle-orm/pg-core';
import { z } from 'zod';
import { database } from '../db/client.ts';
import { dataset, version } from '../db/schema/dataset.ts';
import { group } from '../db/schema/group.ts';
import { invitation } from '../db/schema/invitation.ts';
import { material } from '../db/schema/material.ts';
import { person } from '../db/schema/people.ts';
import { screening } from '../db/schema/screening.ts';
import { source } from '../db/schema/source.ts';
import { study } from '../db/schema/study.ts';
import { apiToken } from '../db/schema/token.ts';

/** What the objects of the trail are called, where their number alone says nothing. */

interface AuditedObject {
	objectType: string;
	objectId: string;
}

interface Named {
	table: PgTable;
	id: PgColumn;
	name: PgColumn | SQL<string>;
}

const versionRef = sql<string>`(select ${dataset.slug} from ${dataset} where ${dataset.id} = ${version.datasetId})
	|| '@' || ${version.major} || '.' || ${version.minor}`;

/** Kinds of a thing by the word that the trail has for its type; a membership is two things. */
const KINDS: { types: string[]; of: Named }[] = [
	{ types: ['person', 'membership'], of: { table: person, id: person.id, name: person.name } },
	{ types: ['group', 'membership'], of: { table: group, id: group.id, name: group.name } },
	{ types: ['token'], of: { table: apiToken, id: apiToken.id, name: apiToken.name } },
	{ types: ['invitation'], of: { table: invitation, id: invitation.id, name: invitation.email } },
	{ types: ['material'], of: { table: material, id: material.id, name: material.slug } },
	{ types: ['source'], of: { table: source, id: source.id, name: source.slug } },
	{ types: ['dataset'], of: { table: dataset, id: dataset.id, name: dataset.slug } },
	{ types: ['study'], of: { table: study, id: study.id, name: study.name } },
	{ types: ['screening'], of: { table: screening, id: screening.id, name: screening.name } },
	{ types: ['version'], of: { table: version, id: version.id, name: versionRef } }
];

const isUuid = (id: string) => z.uuid().safeParse(id).success;
const partsOf = (objectId: string) => objectId.split('/');

/** @returns name by object id; what is gone or has no name is left out */
export async function objectNames(entries: readonly AuditedObject[]): Promise<Map<string, string>> {
	const names = new Map<string, string>();
	for (const { types, of } of KINDS) {
		const those = entries.filter(({ objectType }) => types.includes(objectType));
		const ids = [...new Set(those.flatMap(({ objectId }) => partsOf(objectId)).filter(isUuid))];
		if (ids.length === 0) continue;
		const rows = await database()
			.select({ id: sql<string>`${of.id}`, name: sql<string>`${of.name}` })
			.from(of.table)
			.where(inArray(of.id, ids));
		for (const { id, name } of rows) names.set(id, name);
	}
	const told = new Map<string, string>();
	for (const { objectId } of entries) {
		const parts = partsOf(objectId).map((id) => names.get(id));
		if (parts.every((part) => part !== undefined)) told.set(objectId, parts.join(', '));
	}
	return told;
}
