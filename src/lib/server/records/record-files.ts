import { columnsCsv, columnsJson } from '../../format/curve-columns.ts';
import { epsilonShares } from '../../engine/index.ts';
import { factsOf } from '../library/facts-of.ts';
import { sheetSvg, type Sheet } from '../../study-sheet/sheet.ts';
import { decodeStudy } from '../../schemas/study-address.ts';
import type { SavedRecord } from '../../schemas/record.ts';
import type { VersionDetail } from '../../schemas/version.ts';
import { NotFound } from '../errors.ts';
import * as versions from '../library/versions.ts';
import { archive } from './archive.ts';
import { bibtex, recordPath, ris } from './citation.ts';
import { drawnSheet } from './drawn-sheet.ts';
import { recordColumns } from './record-columns.ts';
import type { FoundRecord } from './records.ts';
import { sheetPdf } from './sheet-pdf.ts';

/** Files of a record, by their names. */

const FILES = [
	'record.json',
	'archive.zip',
	'curves.csv',
	'curves.json',
	'sheet.svg',
	'sheet.pdf',
	'citation.bib',
	'citation.ris'
] as const;

type FileName = (typeof FILES)[number];

const TYPES: Record<FileName, string> = {
	'record.json': 'application/json',
	'archive.zip': 'application/zip',
	'curves.csv': 'text/csv; charset=utf-8',
	'curves.json': 'application/json',
	'sheet.svg': 'image/svg+xml',
	'sheet.pdf': 'application/pdf',
	'citation.bib': 'application/x-bibtex; charset=utf-8',
	'citation.ris': 'application/x-research-info-systems; charset=utf-8'
};

const isFile = (name: string): name is FileName => (FILES as readonly string[]).includes(name);

export interface RecordFile {
	/** Suggested name: files of several records lie in one folder. */
	name: string;
	type: string;
	content: string | Uint8Array;
}

/** @throws NotFound for a name that is none of them */
export async function recordFile(found: FoundRecord, name: string, origin: string): Promise<RecordFile> {
	if (!isFile(name))
		throw new NotFound(
			`A record has no file “${name}”. It has ${FILES.slice(0, -1).join(', ')} and ${FILES.at(-1)}.`
		);
	return {
		name: `record-${found.record.checksum.slice(0, 12)}-${name}`,
		type: TYPES[name],
		content: await contentOf(found, name, origin)
	};
}

async function contentOf(found: FoundRecord, name: FileName, origin: string): Promise<string | Uint8Array> {
	const { record, text } = found;
	switch (name) {
		case 'record.json':
			return text;
		case 'archive.zip':
			return archive(found, await versionsOf(record), origin);
		case 'curves.csv':
			return columnsCsv(recordColumns(record, origin));
		case 'curves.json':
			return columnsJson(recordColumns(record, origin));
		case 'sheet.svg':
			return sheetSvg(await recordSheet(record, origin));
		case 'sheet.pdf':
			return sheetPdf(await recordSheet(record, origin), record.content.frozenAt);
		case 'citation.bib':
			return bibtex(record, await versionsOf(record), origin);
		case 'citation.ris':
			return ris(record, await versionsOf(record), origin);
	}
}

/** The versions as the library has them; withdrawn ones keep their content. */
export async function versionsOf({ content }: Pick<SavedRecord, 'content'>): Promise<VersionDetail[]> {
	return Promise.all(
		content.versions.map(({ ref }) => {
			const [slug, number] = ref.split('@');
			return versions.get(slug, number);
		})
	);
}

/** The picture of the frozen curves; the states of its inputs are those of today. */
export async function recordSheet(record: SavedRecord, origin: string): Promise<Sheet> {
	const { content, checksum } = record;
	const { study } = decodeStudy(new URLSearchParams(content.query));
	const resolved = await versions.resolve(content.versions.map(({ ref }) => ref));
	const facts = Object.fromEntries([...resolved].map(([ref, one]) => [ref, factsOf(one, epsilonShares)]));
	return drawnSheet({
		...{ study, facts, answers: content.choices },
		engine: content.engine,
		computedAt: content.frozenAt,
		address: `${origin}${recordPath(checksum)}`,
		title: content.name
	});
}
