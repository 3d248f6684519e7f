import styles from '../../../app.css?raw';
import type { ForcePoint } from '../../engine/contract.ts';
import { percent } from '../../format/number.ts';
import { quantityLine } from '../../format/quantity.ts';
import { axisUnit, scaleFor } from '../../format/units.ts';
import { drawnChoices } from '../../study-sheet/drawn.ts';
import { quantityFacts, quantityHeading, quantityWord, shapeName } from '../../study-sheet/quantities.ts';
import { readingAt, spreadOf } from '../../study-sheet/readings.ts';
import type { Sheet } from '../../study-sheet/sheet.ts';
import {
	blockLines,
	conditionWords,
	conductionOfAll,
	ingredients,
	relianceWords,
	studyTitle
} from '../../study-sheet/title-block.ts';
import { worstState, type VersionFacts } from '../../study-sheet/version-facts.ts';
import { choiceLetter } from '../../schemas/study-slots.ts';
import type { Study } from '../../schemas/study.ts';

/** The stack of a study as a picture that the server draws: the same one that the page hands out. */

/** Colours of the light page, read from the style sheet itself. */
const light = new Map(
	[...(/:root\s*\{([^}]*)\}/.exec(styles)?.[1] ?? '').matchAll(/--([\w-]+):\s*(#[0-9a-f]+)/g)].map(
		([, name, value]) => [name, value]
	)
);

export interface SheetOf {
	study: Study;
	facts: Record<string, VersionFacts>;
	/** One a model choice. */
	answers: readonly { points: readonly ForcePoint[] }[];
	engine: string;
	/** ISO, in UTC. */
	computedAt: string;
	/** Stands at the foot of the block. */
	address: string;
	/** Instead of one made from what stands in the study. */
	title?: string;
}

export function drawnSheet({ study, facts, answers, engine, computedAt, address, title }: SheetOf): Sheet {
	const { quantity, shape, against, atNm } = study;
	const quantities = quantityFacts(quantity, shape);
	const letters = study.choices.map((_, index) => choiceLetter(index));
	const choices = drawnChoices(
		study.choices.map(({ name }, index) => ({ name, points: answers[index].points, previous: [] })),
		...([quantity, quantities.solid, against, shape] as const)
	);
	const unsigned = choices.map(({ letter, ink, series }) => ({
		letter,
		ink,
		series: quantities.solid === -1 ? series : { ...series, values: series.values.map((value) => -value) }
	}));
	const readings = unsigned.flatMap((source, index) => {
		const reading = readingAt(source, answers[index].points, quantity, atNm);
		return reading ? [reading] : [];
	});
	const used = ingredients(study, facts, letters);
	const scale = scaleFor(quantities.unit, {});
	const unit = axisUnit(quantities.unit, {});
	const [solid, hollow] = quantities.bars;
	const block = blockLines(
		{
			heading: quantityHeading(quantity, shape),
			atNm,
			spread: spreadOf(readings),
			ingredients: used,
			conduction: conductionOfAll(study, facts, letters),
			reliance: relianceWords(used, atNm),
			conditions: conditionWords(study, shapeName(shape.kind)),
			engine,
			computedAt,
			worst: worstState(used.map((one) => one.facts)),
			percent: (share) => percent(share)
		},
		readings,
		scale,
		(value) => quantityWord(quantities, value),
		address
	);
	return {
		title: title ?? studyTitle(study, facts),
		magnitudeLabel: `${quantities.label}, magnitude in ${unit.symbol}`,
		legend: `solid line ${solid}, hollow line ${hollow}`,
		comparisonLabel:
			against === 'ideal'
				? 'Ratio to ideal conductors in vacuum at zero temperature'
				: `Difference from ${choiceLetter(against)}`,
		comparisonInPercent: against !== 'ideal',
		decadeLabel: (value) => quantityLine(value, scaleFor('length', {}), 1),
		...{ fromNm: study.fromNm, toNm: study.toNm, atNm, unitSize: unit.size },
		choices,
		words: { '-1': solid, '0': 'no force', '1': hollow },
		block,
		colour: (token) => light.get(token) ?? 'currentColor'
	};
}
