import { sql } from 'drizzle-orm';
import {
	check,
	customType,
	doublePrecision,
	index,
	integer,
	jsonb,
	pgTable,
	primaryKey,
	text,
	uuid
} from 'drizzle-orm/pg-core';
import type { ScreeningPlan, ScreeningStatement } from '../../../schemas/screening.ts';
import { instant, isOneOf } from './columns.ts';
import { group } from './group.ts';
import { person } from './people.ts';
import { VISIBILITIES, type Visibility } from './study.ts';

/** Searches over many arrangements, and their results by chunk. */

export const SCREENING_STATES = ['queued', 'running', 'paused', 'finished', 'cancelled', 'failed'] as const;
export type ScreeningState = (typeof SCREENING_STATES)[number];

const bytes = customType<{ data: Buffer; driverData: Buffer }>({ dataType: () => 'bytea' });

export const screening = pgTable(
	'screening',
	{
		id: uuid().primaryKey().defaultRandom(),
		ownerId: uuid()
			.notNull()
			.references(() => person.id, { onDelete: 'restrict' }),
		groupId: uuid().references(() => group.id, { onDelete: 'restrict' }),
		visibility: text().$type<Visibility>().notNull().default('private'),
		name: text().notNull(),
		statement: jsonb().$type<ScreeningStatement>().notNull(),
		/** The statement with every version named: what is computed, whatever is published later. */
		plan: jsonb().$type<ScreeningPlan>().notNull(),
		/** SHA-256 of the plan and, once finished, of all results in their order. */
		checksum: text(),
		state: text().$type<ScreeningState>().notNull().default('queued'),
		cells: integer().notNull(),
		cellsDone: integer().notNull().default(0),
		chunks: integer().notNull(),
		chunksDone: integer().notNull().default(0),
		estimatedSeconds: doublePrecision().notNull(),
		/** Sum over the workers. */
		computedSeconds: doublePrecision().notNull().default(0),
		engine: text().notNull(),
		runtime: text(),
		/** The screening that this one repeats with newer versions. */
		basisId: uuid(),
		failure: text(),
		createdAt: instant().notNull(),
		startedAt: instant(),
		finishedAt: instant()
	},
	(table) => [
		check('screening_name_given', sql`length(trim(${table.name})) between 1 and 200`),
		check('screening_state_known', isOneOf(table.state, SCREENING_STATES)),
		check('screening_visibility_known', isOneOf(table.visibility, VISIBILITIES)),
		check('screening_group_visible', sql`${table.visibility} <> 'group' or ${table.groupId} is not null`),
		check('screening_done_range', sql`${table.chunksDone} between 0 and ${table.chunks}`),
		index('screening_owner_index').on(table.ownerId, table.createdAt),
		index('screening_group_index').on(table.groupId, table.createdAt)
	]
);

/** Consecutive cells, computed and stored together. */
export const screeningChunk = pgTable(
	'screening_chunk',
	{
		screeningId: uuid()
			.notNull()
			.references(() => screening.id, { onDelete: 'restrict' }),
		position: integer().notNull(),
		fromCell: integer().notNull(),
		toCell: integer().notNull(),
		/** 64-bit floats, little-endian: of each cell its pressures in the order of the separations, Pa; NaN: refused. */
		pressures: bytes(),
		/** 32-bit floats: relative bounds in the same order. */
		bounds: bytes(),
		doneAt: instant(),
		seconds: doublePrecision(),
		worker: text()
	},
	(table) => [
		primaryKey({ name: 'screening_chunk_pkey', columns: [table.screeningId, table.position] }),
		check('screening_chunk_range', sql`${table.fromCell} >= 0 and ${table.toCell} > ${table.fromCell}`),
		check(
			'screening_chunk_whole',
			sql`num_nonnulls(${table.pressures}, ${table.bounds}, ${table.doneAt}) in (0, 3)`
		)
	]
);
