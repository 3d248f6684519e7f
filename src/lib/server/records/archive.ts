import { strToU8, zipSync, type Zippable } from 'fflate';
import { columnsCsv, columnsJson } from '../../format/curve-columns.ts';
import { forceRequest } from '../../schemas/force.ts';
import type { VersionDetail } from '../../schemas/version.ts';
import { planForces } from '../compute/forces.ts';
import { canonicalJson, sha256 } from '../library/canonical.ts';
import { tableCsv } from '../library/downloads.ts';
import { bibtex, plain, ris, sources } from './citation.ts';
import { recipe } from './recipe.ts';
import { recordColumns } from './record-columns.ts';
import type { FoundRecord } from './records.ts';

/** A record as one file that is of use without this installation: inputs, data, results, and how to check them. */

/** In a name of a file; a version is `slug@number`. */
const fileOf = (ref: string) => ref.replace('@', '_');

/**
 * @param versions  those of the record, with their models
 * @param origin    for the addresses inside
 */
export async function archive(
	{ record, text }: FoundRecord,
	versions: readonly VersionDetail[],
	origin: string
): Promise<Uint8Array> {
	const { content } = record;
	const files = new Map<string, string>();
	files.set('record.json', text);
	for (const { letter, request } of content.choices) {
		// Written canonically, the file's own SHA-256 is the input checksum that the record states.
		const plan = await planForces(forceRequest.parse(request));
		files.set(`inputs/${letter}.json`, canonicalJson(plan.request));
	}
	for (const version of versions) {
		files.set(`models/${fileOf(version.ref)}.json`, canonicalJson(version.model));
		if (version.table) files.set(`tables/${fileOf(version.ref)}.csv`, await tableCsv(version, origin));
	}
	const columns = recordColumns(record, origin);
	files.set('results/curves.csv', columnsCsv(columns));
	files.set('results/curves.json', columnsJson(columns));
	files.set('citations.bib', bibtex(record, versions, origin));
	files.set('citations.ris', ris(record, versions, origin));
	files.set(
		'citations.txt',
		[
			plain(record, origin),
			...content.versions.map(({ citation }) => citation),
			...sources(versions),
			''
		].join('\n\n')
	);
	files.set('README.txt', recipe(record, origin));
	files.set(
		'SHA256SUMS',
		[...files].map(([name, content]) => `${sha256(content).replace('sha256:', '')}  ${name}\n`).join('')
	);
	// The same record gives the same bytes: every file carries the time of freezing.
	const options = { mtime: new Date(content.frozenAt), level: 6 } as const;
	const packed: Zippable = Object.fromEntries(
		[...files].map(([name, content]) => [
			`record-${record.checksum.slice(0, 12)}/${name}`,
			[strToU8(content), options] as const
		])
	) as Zippable;
	return zipSync(packed);
}
