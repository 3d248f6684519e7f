import { and, eq, sql } from 'drizzle-orm';
import { INSTALLATION } from '../audit/append.ts';
import type { Database, Transaction } from '../db/client.ts';
import { dataset, version } from '../db/schema/dataset.ts';
import { setting } from '../db/schema/setting.ts';
import { Conflict } from '../errors.ts';
import { keepDataset, keepMaterial, keepSource } from './catalogue.ts';
import { draftFromModel, draftFromTable, type Draft } from './drafts.ts';
import { takeStep } from './review.ts';
import { readSeedFiles, type SeedPart, type SeedVersion } from './seed-files.ts';

/** Digests of what was loaded, by the name of the part: a second start compares and does nothing. */
const SETTING = 'library.seed';

export interface SeedReport {
	/** Parts that were written. */
	written: number;
	/** Parts that were there already. */
	unchanged: number;
}

/**
 * Brings the published data that ship with the application into the library, by the path of an upload: read, checked,
 * sourced, submitted and published by the installation, each dataset in a transaction of its own.
 *
 * @throws Error naming the part that does not pass
 */
export async function seedLibrary(database: Database, folder: string, now = new Date()): Promise<SeedReport> {
	const files = await readSeedFiles(folder);
	const loaded = await readDigests(database);
	const fresh = <T>(parts: SeedPart<T>[]) => parts.filter(({ name, digest }) => loaded[name] !== digest);
	const total = files.sources.length + files.materials.length + files.versions.length;

	const sources = fresh(files.sources);
	const materials = fresh(files.materials);
	const versions = fresh(files.versions);
	if (sources.length + materials.length > 0) {
		await database.transaction(async (tx) => {
			for (const { content } of sources) await keepSource(tx, content, INSTALLATION);
			for (const { content } of materials) await keepMaterial(tx, content, INSTALLATION);
			await writeDigests(tx, [...sources, ...materials]);
		});
	}
	for (const part of versions) {
		try {
			await database.transaction((tx) => publishPart(tx, part, now));
		} catch (error) {
			throw new Error(
				`The seed stops at ${part.name}: ${error instanceof Error ? error.message : String(error)}`,
				{
					cause: error
				}
			);
		}
	}
	const written = sources.length + materials.length + versions.length;
	return { written, unchanged: total - written };
}

type VersionPart = SeedPart<{ material: string; version: SeedVersion; raw: Buffer | null }>;

async function publishPart(tx: Transaction, part: VersionPart, now: Date): Promise<void> {
	const { material, version: seed, raw } = part.content;
	await keepDataset(tx, { ...seed.dataset, material }, INSTALLATION);
	const [major, minor] = seed.number.split('.').map(Number);
	await refuseSecond(tx, seed, major, minor);

	const place = {
		datasetSlug: seed.dataset.slug,
		number: { major, minor },
		actor: INSTALLATION,
		answers: seed.answers
	};
	const draft =
		'file' in seed
			? await draftFromTable(tx, place, { name: seed.file, bytes: raw ?? Buffer.alloc(0) }, seed.description)
			: await draftFromModel(tx, place, seed.model, seed.description);
	checkAnswers(draft, seed.answers);
	const step = { versionId: draft.id, checksum: draft.checksum, actor: INSTALLATION, now };
	await takeStep(tx, 'submit', step);
	await takeStep(tx, 'publish', step);
	await writeDigests(tx, [part]);
}

/** A published version never changes, so a changed file of the seed must carry a new number. */
async function refuseSecond(tx: Transaction, seed: SeedVersion, major: number, minor: number): Promise<void> {
	const [there] = await tx
		.select({ id: version.id })
		.from(version)
		.innerJoin(dataset, eq(version.datasetId, dataset.id))
		.where(and(eq(dataset.slug, seed.dataset.slug), eq(version.major, major), eq(version.minor, minor)));
	if (there) throw new Conflict(`version ${seed.number} is published with other content; raise its number.`);
}

function checkAnswers({ checks }: Draft, answers: Record<string, string>): void {
	const blocking = checks.filter(
		({ code, severity }) => severity === 'fail' || (severity === 'warn' && !answers[code])
	);
	if (blocking.length > 0) {
		throw new Error(
			blocking.map(({ code, severity, message }) => `${severity} ${code}: ${message}`).join(' ')
		);
	}
}

async function readDigests(database: Database): Promise<Record<string, string>> {
	const [row] = await database.select({ value: setting.value }).from(setting).where(eq(setting.key, SETTING));
	return isDigests(row?.value) ? row.value : {};
}

const isDigests = (value: unknown): value is Record<string, string> =>
	typeof value === 'object' && value !== null;

async function writeDigests(tx: Transaction, parts: SeedPart<unknown>[]): Promise<void> {
	const digests = Object.fromEntries(parts.map(({ name, digest }) => [name, digest]));
	await tx
		.insert(setting)
		.values({ key: SETTING, value: digests, updatedBy: INSTALLATION })
		.onConflictDoUpdate({
			target: setting.key,
			set: { value: sql`${setting.value} || excluded.value`, updatedAt: sql`now()`, updatedBy: INSTALLATION }
		});
}
