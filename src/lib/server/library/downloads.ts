import type { VersionDetail } from '../../schemas/version.ts';
import { database, type Executor } from '../db/client.ts';
import { NotFound } from '../errors.ts';
import { sourceText, versionPath } from './citation.ts';
import { givenTable } from './versions.ts';
import type { Viewer } from './viewer.ts';

/** Files that leave the library. Numbers are written so that they read back to the same bits. */

/** Words of the heading row and their units, as the upload reads them. */
const HEADINGS: Record<string, [name: string, unit: string]> = {
	eV: ['photon energy', 'eV'],
	nm: ['wavelength', 'nm'],
	um: ['wavelength', 'um'],
	'cm^-1': ['wave number', 'cm^-1'],
	Hz: ['frequency', 'Hz'],
	'rad/s': ['angular frequency', 'rad/s'],
	n: ['n', '1'],
	k: ['k', '1'],
	epsilon1: ['epsilon1', '1'],
	epsilon2: ['epsilon2', '1'],
	epsilonImaginary: ['epsilon(i xi)', '1']
};

/** Text in a comment line: one line, whatever was typed. */
const commented = (text: string): string => `# ${text.replace(/\s+/g, ' ').trim()}`;

/**
 * The rows as given, under a provenance in comment lines, a heading row and a units row.
 *
 * @throws NotFound for a closed form, which has no rows
 */
export async function tableCsv(
	version: VersionDetail,
	origin = '',
	executor: Executor = database(),
	viewer: Viewer | null = null
): Promise<string> {
	const table = await givenTable(version.dataset.slug, version.number, executor, viewer);
	if (!table)
		throw new NotFound('This version is a closed form and has no rows. Its model is in model.json.');
	const names: [string, string][] = [
		...[table.columns.abscissaUnit, ...table.columns.quantities].map(
			(name): [string, string] => HEADINGS[name] ?? [name, '1']
		),
		...table.uncertainties.map(({ quantity }): [string, string] => [`uncertainty of ${quantity}`, '1'])
	];
	const provenance = [
		`${version.material.name}: ${version.dataset.title}, version ${version.number}`,
		`${version.ref}, ${origin}${versionPath(version)}`,
		`checksum of the model ${version.checksum}`,
		`published ${version.publishedAt ?? 'never'}, quality ${version.quality}${version.qualityReason ? `: ${version.qualityReason}` : ''}`,
		...version.sources.map((source) => `source: ${sourceText(source)}`)
	];
	const rows = table.abscissa.map((abscissa, index) => [
		abscissa,
		...table.ordinates.map((column) => column[index]),
		...table.uncertainties.map(({ values }) => values[index])
	]);
	return [
		...provenance.map(commented),
		names.map(([name]) => name).join(','),
		names.map(([, unit]) => (unit === '1' ? '(none)' : unit)).join(','),
		...rows.map((row) => row.map(String).join(',')),
		''
	].join('\n');
}
