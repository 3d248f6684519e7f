import { and, asc, desc, eq, inArray, or, sql } from 'drizzle-orm';
import type { ResolvedVersion, VersionDetail } from '../../schemas/version.ts';
import { database, type Executor } from '../db/client.ts';
import { checkResult, dataset, version } from '../db/schema/dataset.ts';
import { NotFound } from '../errors.ts';
import { nameOf, selectVersions, sourcesOf, toSummary, type VersionRow } from './read-versions.ts';
import { statedUncertainty } from './stated-uncertainty.ts';
import { PUBLIC_STATES, type Viewer } from './viewer.ts';

/** Reading versions: published ones, and for a viewer also what has not been published yet. Withdrawn ones keep their address. */

const NUMBER = /^(\d{1,6})\.(\d{1,6})$/;

/** Anything else names nothing, and some of it the database would choke on. */
const SLUG = /^[a-z0-9]+(-[a-z0-9]+)*$/;

export const refOf = (slug: string, number: string): string => `${slug}@${number}`;

export function partsOf(ref: string): { slug: string; major: number; minor: number } | null {
	const [slug, number] = ref.split('@');
	const match = NUMBER.exec(number ?? '');
	return match && SLUG.test(slug) ? { slug, major: Number(match[1]), minor: Number(match[2]) } : null;
}

const matches = ({ slug, major, minor }: { slug: string; major: number; minor: number }) =>
	and(eq(dataset.slug, slug), eq(version.major, major), eq(version.minor, minor));

async function findRow(
	executor: Executor,
	slug: string,
	number: string,
	viewer: Viewer | null
): Promise<VersionRow> {
	const parts = partsOf(refOf(slug, number));
	const [row] = parts ? await selectVersions(executor, matches(parts), viewer) : [];
	if (!row) throw new NotFound(`There is no version ${number} of a dataset "${slug}".`);
	return row;
}

/** @throws NotFound where there is none, or none that may be seen */
export async function get(
	slug: string,
	number: string,
	executor: Executor = database(),
	viewer: Viewer | null = null
): Promise<VersionDetail> {
	const row = await findRow(executor, slug, number, viewer);
	const sources = await sourcesOf(executor, [row.id]);
	const checks = await executor
		.select()
		.from(checkResult)
		.where(eq(checkResult.versionId, row.id))
		.orderBy(asc(checkResult.position));
	const [rest] = await executor
		.select({
			model: version.model,
			sample: version.sample,
			parentId: version.parentId,
			createdAt: version.createdAt,
			withdrawnAt: version.withdrawnAt,
			withdrawnBy: nameOf(version.withdrawnBy),
			withdrawnReason: version.withdrawnReason,
			givenColumns: version.givenColumns,
			rowCount: sql<number>`coalesce(cardinality(${version.givenAbscissa}), 0)`,
			rawName: version.rawName,
			rawSha256: version.rawSha256,
			rawBytes: sql<number>`coalesce(octet_length(${version.raw}), 0)`
		})
		.from(version)
		.where(eq(version.id, row.id));
	const relatives = await executor
		.select({ id: version.id, parentId: version.parentId, major: version.major, minor: version.minor })
		.from(version)
		.where(
			and(
				inArray(version.state, PUBLIC_STATES),
				or(eq(version.parentId, row.id), rest.parentId ? eq(version.id, rest.parentId) : undefined)
			)
		)
		.orderBy(asc(version.major), asc(version.minor));
	const numberOf = (relative: { major: number; minor: number }) => `${relative.major}.${relative.minor}`;
	const parent = relatives.find(({ id }) => id === rest.parentId);

	return {
		...toSummary(row, sources.get(row.id) ?? []),
		dataset: { slug: row.datasetSlug, title: row.datasetTitle },
		material: materialOf(row),
		model: rest.model,
		checks: checks.map(({ code, severity, message, figure, threshold, answer }) => ({
			code,
			severity,
			message,
			figure,
			threshold,
			answer
		})),
		sample: rest.sample,
		parent: parent ? numberOf(parent) : null,
		successors: relatives.filter(({ parentId }) => parentId === row.id).map(numberOf),
		createdAt: rest.createdAt.toISOString(),
		withdrawn:
			rest.withdrawnAt && rest.withdrawnBy && rest.withdrawnReason
				? { at: rest.withdrawnAt.toISOString(), by: rest.withdrawnBy, reason: rest.withdrawnReason }
				: null,
		table: rest.givenColumns && {
			...rest.givenColumns,
			rowCount: rest.rowCount,
			raw:
				rest.rawName && rest.rawSha256
					? { name: rest.rawName, sha256: rest.rawSha256, bytes: rest.rawBytes }
					: null
		}
	};
}

const materialOf = (row: VersionRow) => ({
	slug: row.materialSlug,
	name: row.materialName,
	formula: row.formula,
	class: row.materialClass,
	hazards: row.hazards
});

/** Number of the newest published version of a dataset. */
export async function latestNumber(slug: string, executor: Executor = database()): Promise<string> {
	const [row] = await executor
		.select({ major: version.major, minor: version.minor })
		.from(version)
		.innerJoin(dataset, eq(version.datasetId, dataset.id))
		.where(and(eq(dataset.slug, slug), eq(version.state, 'published')))
		.orderBy(desc(version.major), desc(version.minor))
		.limit(1);
	if (!row) throw new NotFound(`There is no dataset "${slug}" with a published version.`);
	return `${row.major}.${row.minor}`;
}

/** How many versions one request may pin; an arrangement has at most 83 places. */
export const RESOLVE_MAX = 200;

/** What a computation needs of each pinned version. Refs that name nothing are missing from the answer. */
export async function resolve(
	refs: readonly string[],
	executor: Executor = database(),
	viewer: Viewer | null = null
): Promise<Map<string, ResolvedVersion>> {
	const wanted = [...new Set(refs)]
		.slice(0, RESOLVE_MAX)
		.map(partsOf)
		.filter((parts) => parts !== null);
	if (wanted.length === 0) return new Map();
	const rows = await selectVersions(executor, or(...wanted.map(matches)), viewer);
	const ids = rows.map(({ id }) => id);
	const sources = await sourcesOf(executor, ids);
	const models = await modelsOf(executor, ids);
	return new Map(
		rows.map((row) => {
			const { ref, checksum, quality, qualityReason, state, supersededBy, conducts, measuredRangeEv } =
				toSummary(row, []);
			const resolved: ResolvedVersion = {
				ref,
				model: { kind: 'vacuum' },
				...models.get(row.id),
				checksum,
				quality,
				qualityReason,
				state,
				supersededBy,
				datasetTitle: row.datasetTitle,
				conducts,
				material: materialOf(row),
				measuredRangeEv,
				sources: sources.get(row.id) ?? []
			};
			return [ref, resolved];
		})
	);
}

async function modelsOf(
	executor: Executor,
	ids: string[]
): Promise<Map<string, Pick<ResolvedVersion, 'model' | 'uncertainty'>>> {
	if (ids.length === 0) return new Map();
	const rows = await executor
		.select({
			id: version.id,
			model: version.model,
			columns: version.givenColumns,
			abscissa: version.givenAbscissa,
			first: version.givenFirst,
			second: version.givenSecond,
			uncertainties: version.givenUncertainties
		})
		.from(version)
		.where(inArray(version.id, ids));
	return new Map(rows.map((row) => [row.id, { model: row.model, uncertainty: statedUncertainty(row) }]));
}

export interface GivenTable {
	columns: { abscissaUnit: string; quantities: string[] };
	abscissa: number[];
	ordinates: number[][];
	epsilon1: number[] | null;
	uncertainties: { quantity: string; values: number[] }[];
}

/** Rows as given; null for a closed form. */
export async function givenTable(
	slug: string,
	number: string,
	executor: Executor = database(),
	viewer: Viewer | null = null
): Promise<GivenTable | null> {
	const { id } = await findRow(executor, slug, number, viewer);
	const [row] = await executor
		.select({
			columns: version.givenColumns,
			abscissa: version.givenAbscissa,
			first: version.givenFirst,
			second: version.givenSecond,
			epsilon1: version.epsilon1,
			uncertainties: version.givenUncertainties
		})
		.from(version)
		.where(eq(version.id, id));
	if (!row.columns || !row.abscissa || !row.first) return null;
	return {
		columns: row.columns,
		abscissa: row.abscissa,
		ordinates: row.second ? [row.first, row.second] : [row.first],
		epsilon1: row.epsilon1,
		uncertainties: row.uncertainties ?? []
	};
}

/** The uploaded bytes as they came. */
export async function rawFile(
	slug: string,
	number: string,
	executor: Executor = database(),
	viewer: Viewer | null = null
): Promise<{ name: string; bytes: Buffer; sha256: string }> {
	const { id } = await findRow(executor, slug, number, viewer);
	const [row] = await executor
		.select({ name: version.rawName, bytes: version.raw, sha256: version.rawSha256 })
		.from(version)
		.where(eq(version.id, id));
	if (!row.name || !row.bytes || !row.sha256)
		throw new NotFound('This version is a closed form and came without a file. Its model is in model.json.');
	return { name: row.name, bytes: row.bytes, sha256: row.sha256 };
}
