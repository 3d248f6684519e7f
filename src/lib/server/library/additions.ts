import type { DatasetFields } from '../../schemas/dataset.ts';
import type { MaterialFields } from '../../schemas/material.ts';
import type { SignedIn } from '../../schemas/person.ts';
import type { SourceFields } from '../../schemas/source.ts';
import { database } from '../db/client.ts';
import { createDataset, createMaterial, createSource } from './catalogue.ts';
import { draftFromModel, draftFromTable, type Draft } from './drafts.ts';
import type { PostedVersion } from './posted-version.ts';

/** What a curator adds to the library: each in a transaction of its own. */

export const addMaterial = (actor: SignedIn, fields: MaterialFields): Promise<void> =>
	database().transaction((tx) => createMaterial(tx, fields, actor.id));

export const addSource = (actor: SignedIn, fields: SourceFields): Promise<void> =>
	database().transaction((tx) => createSource(tx, fields, actor.id));

export const addDataset = (actor: SignedIn, fields: DatasetFields): Promise<void> =>
	database().transaction((tx) => createDataset(tx, fields, actor.id));

/** @throws RefusedFile, InvalidInput; then nothing is left of it */
export const addVersion = (actor: SignedIn, datasetSlug: string, posted: PostedVersion): Promise<Draft> =>
	database().transaction((tx) => {
		const place = { datasetSlug, actor: actor.id };
		return 'raw' in posted
			? draftFromTable(tx, place, posted.raw, posted.description)
			: draftFromModel(tx, place, posted.model, posted.description);
	});
