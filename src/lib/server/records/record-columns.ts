import { curveColumns, type CurveColumns } from '../../format/curve-columns.ts';
import type { SavedRecord } from '../../schemas/record.ts';
import { decodeStudy } from '../../schemas/study-address.ts';
import { plain } from './citation.ts';

/** The curves of a record as columns, under where they come from. */
export function recordColumns(record: SavedRecord, origin: string): CurveColumns {
	const { content, checksum } = record;
	const { study } = decodeStudy(new URLSearchParams(content.query));
	const perLength = study.shape.kind === 'cylinderPlate' || study.shape.kind === 'parallelCylinders';
	return curveColumns(content.choices, perLength ? 'N/m' : 'N', [
		plain(record, origin),
		`record sha256:${checksum}; engine ${content.engine}; runtime ${content.runtime}; frozen ${content.frozenAt}`,
		...content.choices.map(({ letter, name, reason }) => `${letter}: ${name}${reason ? `, ${reason}` : ''}`),
		...content.versions.map(({ ref, checksum: of, quality }) => `${ref} (${quality}) ${of}`),
		'free energy, pressure and gradient are those of plates; negative pressure attracts; a bound is relative to the value before it',
		...record.flags.map(({ ref, kind, words }) => `${ref} was ${kind} since: ${words}`)
	]);
}
