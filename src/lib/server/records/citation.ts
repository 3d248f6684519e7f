import type { SavedRecord } from '../../schemas/record.ts';
import type { VersionDetail } from '../../schemas/version.ts';
import { bibtex as versionBibtex, sourceText } from '../library/citation.ts';
import { ris as versionRis } from '../library/citation-files.ts';

/** How a record is cited: itself, each version it rests on, each source behind them. */

export const recordPath = (checksum: string): string => `/records/${checksum}`;

type Cited = Pick<SavedRecord, 'checksum' | 'content'>;

const titleOf = ({ content: { name, title } }: Cited) => (name === title ? name : `${name}: ${title}`);

/** One sentence for the record. */
export function plain(record: Cited, origin: string): string {
	const { authors, frozenAt, engine } = record.content;
	return `${authors.join(', ')}, ${titleOf(record)}. Hairsbreadth record (${frozenAt.slice(0, 4)}), engine ${engine}, ${origin}${recordPath(record.checksum)}.`;
}

/** Each source once, however many versions rest on it. */
export function sources(versions: readonly VersionDetail[]): string[] {
	return [...new Set(versions.flatMap((version) => version.sources.map(sourceText)))];
}

const escaped = (text: string) =>
	text
		.replace(/[\\{}]/g, '')
		.replace(/[&%$#_]/g, '\\$&')
		.replace(/\^/g, '\\^{}');

export function bibtex(record: Cited, versions: readonly VersionDetail[], origin: string): string {
	const { authors, frozenAt, engine } = record.content;
	const own = [
		`@misc{record-${record.checksum.slice(0, 12)},`,
		`  title = {{${escaped(titleOf(record))}}},`,
		`  author = {${authors.map((author) => `{${escaped(author)}}`).join(' and ')}},`,
		`  year = {${frozenAt.slice(0, 4)}},`,
		`  howpublished = {Hairsbreadth record},`,
		`  url = {${origin}${recordPath(record.checksum)}},`,
		`  note = {sha256:${record.checksum}, engine ${escaped(engine)}}`,
		'}',
		''
	].join('\n');
	return onceEach([own, ...versions.map((version) => versionBibtex(version, origin))]).bib();
}

/** Files of citations as one: two versions that share a source must not define it twice. */
export function onceEach(files: readonly string[]): { bib: () => string; ris: () => string } {
	const entries = (split: RegExp) => [
		...new Set(files.flatMap((file) => file.split(split)).map((entry) => entry.trim()))
	];
	const given = (entry: string) => entry !== '';
	return {
		bib: () =>
			`${entries(/\n(?=@)/)
				.filter(given)
				.join('\n\n')}\n`,
		ris: () =>
			`${entries(/(?<=ER {2}- ?)\r\n/)
				.filter(given)
				.join('\r\n')}\r\n`
	};
}

const line = (tag: string, value: string) => `${tag}  - ${value.replace(/\s+/g, ' ').trim()}`;

export function ris(record: Cited, versions: readonly VersionDetail[], origin: string): string {
	const { authors, frozenAt, engine } = record.content;
	const own = [
		'TY  - DATA',
		line('TI', titleOf(record)),
		...authors.map((author) => line('AU', author)),
		line('PY', frozenAt.slice(0, 4)),
		line('UR', `${origin}${recordPath(record.checksum)}`),
		line('N1', `sha256:${record.checksum}, engine ${engine}`),
		'ER  - '
	].join('\r\n');
	return onceEach([own, ...versions.map((version) => versionRis(version, origin))]).ris();
}
