import { readingOf } from '$lib/study-sheet/series.ts';
import { pointAt } from '$lib/study-sheet/readings.ts';
import type { RecordChoice } from '$lib/schemas/record.ts';
import type { Study } from '$lib/schemas/study.ts';

/** The frozen numbers that the page shows: at the hairline, at marks, and evenly over the range. */

export interface Row {
	separationNm: number;
	/** Why it stands here; empty for those that are evenly spread. */
	mark: string;
	cells: ({ value: number; bound: number } | null)[];
}

const EVENLY = 9;

export function rowsOf(study: Study, choices: readonly RecordChoice[]): Row[] {
	const all = choices[0].points.map(({ separationNm }) => separationNm);
	const spread = Array.from(
		{ length: EVENLY },
		(_, index) => all[Math.round((index * (all.length - 1)) / (EVENLY - 1))]
	);
	const marks = new Map<number, string>(spread.map((separationNm) => [separationNm, '']));
	for (const { label, separationNm } of study.marks) marks.set(separationNm, label);
	if (study.parkedNm !== undefined) marks.set(study.parkedNm, 'parked');
	marks.set(study.atNm, 'hairline');
	return [...marks]
		.sort(([a], [b]) => a - b)
		.map(([separationNm, mark]) => ({
			separationNm,
			mark,
			cells: choices.map(({ points }) => {
				const point = pointAt(points, separationNm);
				const reading = point && readingOf(point, study.quantity);
				return reading ? { value: reading.value, bound: reading.bound } : null;
			})
		}))
		.filter(({ cells }) => cells.some((cell) => cell !== null));
}
