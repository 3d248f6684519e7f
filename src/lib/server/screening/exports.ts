import { FIGURES } from '../../screening/criteria.ts';
import type { Ranking } from '../../screening/ranking.ts';
import type { ScreeningPlan, ScreeningSummary } from '../../schemas/screening.ts';
import type { FoundScreening } from './screenings.ts';
import type { Results } from './results.ts';
import { rowOf } from './rows.ts';
import { pressuresOf } from '../../screening/ranking.ts';

/** A screening as a file: ranked rows with every separation, under what they rest on. */

/** One sentence that names it for good, once it is finished. */
export function citation(
	{ id, name, owner, checksum, finishedAt }: ScreeningSummary,
	engine: string,
	origin: string
): string {
	return `${owner}, ${name}. Hairsbreadth screening (${(finishedAt ?? '').slice(0, 4) || 'not finished'}), engine ${engine}, ${origin}/screenings/${id}, ${checksum ?? 'no checksum yet'}.`;
}

function provenance({ screening, row }: FoundScreening, origin: string): string[] {
	const { plan, statement } = row;
	const { words, unit, best } = FIGURES[statement.criterion.kind];
	return [
		citation(screening, row.engine, origin),
		`state ${screening.state}, ${screening.cellsDone} of ${screening.cells} arrangements; engine ${row.engine}; runtime ${row.runtime ?? 'none yet'}`,
		`criterion ${JSON.stringify(statement.criterion)}; figure: ${words}, ${unit}, ${best} first`,
		`rules ${plan.rules.join(', ')}; accuracy asked for ${plan.relativeAccuracy}; negative pressure attracts`,
		...plan.materials.map(({ ref, name, checksum, quality }) => `${ref} (${name}, ${quality}) ${checksum}`)
	];
}

const quoted = (text: string) => (/[",\n\r]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text);

/** A piece at a time: a hundred thousand rows need not stand in memory as one text. */
export function* csv(
	found: FoundScreening,
	results: Results,
	ranking: Ranking,
	origin: string
): Generator<string> {
	const { plan, statement } = found.row;
	const { unit } = FIGURES[statement.criterion.kind];
	const names = [
		...[
			'rank',
			'left',
			'medium',
			'right',
			'temperature',
			'hazard_of_medium',
			'qualifies',
			'figure',
			'figure_low',
			'figure_high',
			'combinations'
		],
		...plan.separationsNm.flatMap((separation) => [
			`pressure_${separation}nm`,
			`bound_${separation}nm`,
			`sign_certainty_${separation}nm`
		]),
		'versions'
	];
	const units = [
		'1',
		'1',
		'1',
		'1',
		'K',
		'1',
		'1',
		unit,
		unit,
		unit,
		'1',
		...plan.separationsNm.flatMap(() => ['Pa', '1', '1']),
		'1'
	];
	yield [...provenance(found, origin).map((line) => `# ${line}`), names.join(','), units.join(','), ''].join(
		'\r\n'
	);
	for (const [place, group] of ranking.entries()) {
		const row = rowOf(plan, results, group, place + 1, 0);
		const pressures = pressuresOf(plan, results, group.cell);
		const count = plan.separationsNm.length;
		const cells = [
			...[row.rank, row.left, row.medium, row.right, row.temperatureK, row.mediumHazard, row.qualifies],
			...[row.figure ?? '', row.low ?? '', row.high ?? '', row.combinations],
			...plan.separationsNm.flatMap((_, at) => [
				Number.isNaN(pressures[at]) ? '' : pressures[at],
				Number.isNaN(pressures[at]) ? '' : results.bounds[group.cell * count + at],
				group.signCertainty[at]
			]),
			row.versions.join(' ')
		];
		yield `${cells.map((cell) => quoted(String(cell))).join(',')}\r\n`;
	}
}

export function* json(
	found: FoundScreening,
	results: Results,
	ranking: Ranking,
	origin: string
): Generator<string> {
	const { plan, statement } = found.row;
	yield `{"provenance":${JSON.stringify(provenance(found, origin))},"statement":${JSON.stringify(statement)},"separationsNm":${JSON.stringify(plan.separationsNm)},"rows":[`;
	for (const [place, group] of ranking.entries()) {
		const {
			query: _query,
			pressurePa: _p,
			errorBound: _b,
			signCertainty: _s,
			...row
		} = rowOf(plan, results, group, place + 1, 0);
		const pressuresPa = pressuresOf(plan, results, group.cell).map((value) =>
			Number.isNaN(value) ? null : value
		);
		yield `${place > 0 ? ',\n' : ''}${JSON.stringify({ ...row, pressuresPa, signCertainty: group.signCertainty })}`;
	}
	yield ']}\n';
}

/** What a repetition with newer versions changed, the largest first. */
export interface Difference {
	left: string;
	medium: string;
	right: string;
	temperatureK: number;
	separationNm: number;
	fromPa: number;
	toPa: number;
	signChanges: boolean;
}

interface Side {
	plan: ScreeningPlan;
	results: Results;
	ranking: Ranking;
}

const DIFFERENCES_MOST = 40;

export function differences(
	before: Side,
	after: Side
): { compared: number; signChanges: number; largest: Difference[] } {
	const named = ({ plan, results, ranking }: Side) =>
		new Map(
			ranking.map((group) => {
				const { left, medium, right, temperatureK } = rowOf(plan, results, group, 0, 0);
				const [first, second] = plan.symmetric ? [left, right].sort() : [left, right];
				return [
					[first, medium, second, temperatureK].join('\u0000'),
					{ group, left, medium, right, temperatureK }
				] as const;
			})
		);
	const old = named(before);
	const found: (Difference & { size: number })[] = [];
	let compared = 0;
	for (const [key, { group, ...names }] of named(after)) {
		const was = old.get(key);
		if (!was) continue;
		compared += 1;
		const from = pressuresOf(before.plan, before.results, was.group.cell);
		const to = pressuresOf(after.plan, after.results, group.cell);
		after.plan.separationsNm.forEach((separationNm, at) => {
			const place = before.plan.separationsNm.indexOf(separationNm);
			const [fromPa, toPa] = [from[place], to[at]];
			if (place < 0 || Number.isNaN(fromPa) || Number.isNaN(toPa) || fromPa === toPa) return;
			const size = Math.abs(toPa - fromPa) / Math.max(Math.abs(toPa), Math.abs(fromPa));
			found.push({ ...names, separationNm, fromPa, toPa, signChanges: fromPa * toPa < 0, size });
		});
	}
	found.sort((a, b) => Number(b.signChanges) - Number(a.signChanges) || b.size - a.size);
	return {
		compared,
		signChanges: found.filter(({ signChanges }) => signChanges).length,
		largest: found.slice(0, DIFFERENCES_MOST).map(({ size: _size, ...rest }) => rest)
	};
}
