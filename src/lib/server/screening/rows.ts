import { encodeStudy } from '../../schemas/study-encode.ts';
import { WORKED_STUDY } from '../../schemas/study-worked.ts';
import type { ModelChoice, Study, StudyBody } from '../../schemas/study.ts';
import { CHOICES_MAX } from '../../schemas/study-limits.ts';
import { cellAt, indexOf, ruleMatters, type Cell } from '../../screening/cells.ts';
import { boundsOf, pressuresOf, type Group, type Ranking } from '../../screening/ranking.ts';
import type { PlanPart, ScreeningPlan, ScreeningRow } from '../../schemas/screening.ts';
import type { Results } from './results.ts';

/** Rows of the ranked list, and the arrangement behind each as a study. */

const finite = (value: number): number | null => (Number.isFinite(value) ? value : null);

export function partName(plan: ScreeningPlan, { of, coating }: PlanPart): string {
	const name = plan.materials[of].name;
	return coating ? `${plan.materials[coating.of].name}, ${coating.thicknessNm} nm, on ${name}` : name;
}

const versionsOf = (plan: ScreeningPlan, cell: Cell): string[] => {
	const parts = [plan.left[cell.left], plan.media[cell.medium], plan.right[cell.right]];
	const places = parts.flatMap(({ of, coating }) => (coating ? [coating.of, of] : [of]));
	return [...new Set(places.map((place) => plan.materials[place].ref))];
};

export function rowOf(
	plan: ScreeningPlan,
	results: Results,
	group: Group,
	rank: number,
	at: number
): ScreeningRow {
	const cell = cellAt(plan, group.cell);
	const medium = plan.media[cell.medium];
	return {
		rank,
		left: partName(plan, plan.left[cell.left]),
		medium: partName(plan, medium),
		right: partName(plan, plan.right[cell.right]),
		temperatureK: plan.temperaturesK[cell.temperature],
		mediumHazard: plan.materials[medium.of].hazard,
		qualifies: group.qualifies,
		figure: group.figure,
		low: group.low,
		high: group.high,
		combinations: group.combinations,
		pressurePa: finite(pressuresOf(plan, results, group.cell)[at]),
		errorBound: finite(boundsOf(plan, results, group.cell)[at]),
		signCertainty: group.signCertainty[at] ?? null,
		query: studyQuery(plan, group.cell, at),
		versions: versionsOf(plan, cell)
	};
}

export function rows(
	plan: ScreeningPlan,
	results: Results,
	ranking: Ranking,
	{ at, from, count }: { at: number; from: number; count: number }
): ScreeningRow[] {
	return ranking
		.slice(from, from + count)
		.map((group, place) => rowOf(plan, results, group, from + place + 1, at));
}

/** The arrangement with its rival data and rules as model choices, as many as a study takes. */
export function studyQuery(plan: ScreeningPlan, index: number, at: number): string {
	const cell = cellAt(plan, index);
	const ref = (of: number) => plan.materials[of].ref;
	const body = ({ of, coating }: PlanPart): StudyBody => ({
		layers: coating ? [{ of: { version: ref(coating.of) }, thicknessNm: coating.thicknessNm }] : [],
		substrate: { version: ref(of) }
	});
	const separations = plan.separationsNm;
	const study: Study = {
		...WORKED_STUDY,
		left: body(plan.left[cell.left]),
		medium: { version: ref(plan.media[cell.medium].of) },
		right: body(plan.right[cell.right]),
		temperatureK: plan.temperaturesK[cell.temperature],
		choices: choicesOf(plan, cell),
		fromNm: Math.max(0.2, separations[0] / 3),
		toNm: Math.min(1e5, separations[separations.length - 1] * 3),
		atNm: separations[at] ?? separations[0],
		marks: []
	};
	return encodeStudy(study);
}

function choicesOf(plan: ScreeningPlan, cell: Cell): ModelChoice[] {
	const rules = plan.rules.filter((_, rule) => rule === 0 || ruleMatters(plan, { ...cell, rule }));
	const conductors = (['left', 'right'] as const).flatMap((side) => {
		const { of, coating } = side === 'left' ? plan.left[cell.left] : plan.right[cell.right];
		return [
			...(plan.materials[of].conducts ? [side] : []),
			...(coating && plan.materials[coating.of].conducts ? [`${side}1`] : [])
		];
	});
	const stated = rules.map((rule): ModelChoice => ({
		name: rule === 'written' ? 'as screened' : rule === 'drude' ? 'Drude' : 'plasma',
		changes:
			rule === 'written' ? {} : Object.fromEntries(conductors.map((slot) => [slot, { zeroFrequency: rule }]))
	}));
	const rival = (
		slot: 'left' | 'medium' | 'right',
		part: PlanPart,
		all: readonly PlanPart[]
	): ModelChoice[] =>
		all
			.filter(({ group, of }) => group === part.group && of !== part.of)
			.map(({ of }) => ({
				name: plan.materials[of].ref.slice(0, 60),
				changes: { [slot]: { version: plan.materials[of].ref } }
			}));
	const rivals = [
		...rival('medium', plan.media[cell.medium], plan.media),
		...rival('left', plan.left[cell.left], plan.left),
		...rival('right', plan.right[cell.right], plan.right)
	];
	return [...stated, ...rivals].slice(0, CHOICES_MAX);
}

export interface GridCell {
	/** Pa at the asked separation; null where it is not computed. */
	pressurePa: number | null;
	signCertainty: number | null;
	query: string;
}

/** Bodies of the left side against media, for one body on the right: the stated data alone. */
export function grid(
	plan: ScreeningPlan,
	results: Results,
	ranking: Ranking,
	{ right, at, temperature }: { right: number; at: number; temperature: number }
): {
	bodies: { name: string; class: string }[];
	media: { name: string; hazard: string }[];
	cells: GridCell[][];
} {
	const stated = (parts: readonly PlanPart[]) =>
		parts.map((part, place) => ({ part, place })).filter(({ part }) => part.reference);
	const [bodies, media, others] = [stated(plan.left), stated(plan.media), stated(plan.right)];
	const other = others[Math.min(right, others.length - 1)];
	const certainty = new Map(ranking.map(({ cell, signCertainty }) => [cell, signCertainty[at] ?? null]));
	return {
		bodies: bodies.map(({ part }) => ({
			name: partName(plan, part),
			class: plan.materials[part.coating?.of ?? part.of].class
		})),
		media: media.map(({ part }) => ({ name: partName(plan, part), hazard: plan.materials[part.of].hazard })),
		cells: bodies.map((body) =>
			media.map((medium) => {
				const index = indexOf(plan, {
					...{ rule: 0, temperature },
					...{ medium: medium.place, left: body.place, right: other.place }
				});
				const pressure = results.done[index] === 1 ? pressuresOf(plan, results, index)[at] : NaN;
				return {
					pressurePa: finite(pressure),
					signCertainty: certainty.get(index) ?? null,
					query: studyQuery(plan, index, at)
				};
			})
		)
	};
}

/** Names of the stated bodies on the right, for choosing one. */
export const rightNames = (plan: ScreeningPlan): string[] =>
	plan.right.filter(({ reference }) => reference).map((part) => partName(plan, part));
