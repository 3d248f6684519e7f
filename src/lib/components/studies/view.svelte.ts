import { percent } from '../../format/number.ts';
import { quantityLine } from '../../format/quantity.ts';
import { scaleFor } from '../../format/units.ts';
import { encodeStudy } from '../../schemas/study-encode.ts';
import { choiceLetter } from '../../schemas/study-slots.ts';
import { otherMessages } from '../arrangement/issues.ts';
import { deviationAt, deviationsOf } from '../../study-sheet/bands.ts';
import { drawnChoices, isPerLength } from '../../study-sheet/drawn.ts';
import { quantityFacts, quantityHeading, quantityWord, shapeName } from '../../study-sheet/quantities.ts';
import { differencesFrom, readingAt, spreadOf, type Reading } from '../../study-sheet/readings.ts';
import type { StudySession } from './session.svelte.ts';
import {
	conditionWords,
	conductionOfAll,
	conductionWords,
	ingredients,
	relianceWords,
	studyTitle,
	type TitleFacts
} from '../../study-sheet/title-block.ts';
import type { UnitMemory } from './units.svelte.ts';
import { worstState, type VersionFacts } from '../../study-sheet/version-facts.ts';

/**
 * What the page shows of a session. Everything that depends on the curves alone is kept apart from what follows the
 * hairline, so that a drag renews a handful of numbers and no path.
 */
export class StudyView {
	readonly #session: StudySession;
	readonly #units: UnitMemory;
	facts: Record<string, VersionFacts> = $state.raw({});

	constructor(session: StudySession, units: UnitMemory, facts: Record<string, VersionFacts>) {
		this.#session = session;
		this.#units = units;
		this.facts = facts;
	}

	study = $derived.by(() => this.#session.study);
	quantity = $derived(this.study.quantity);
	shape = $derived(this.study.shape);
	against = $derived(this.study.against);
	choices = $derived(this.study.choices);
	parkedNm = $derived(this.study.parkedNm);
	letters = $derived(this.choices.map((_, index) => choiceLetter(index)));
	quantities = $derived(quantityFacts(this.quantity, this.shape));
	scale = $derived.by(() => scaleFor(this.quantities.unit, this.#units.choices));
	lengthScale = $derived.by(() => scaleFor('length', this.#units.choices));
	title = $derived(studyTitle(this.study, this.facts));
	curves = $derived.by(() => this.choices.map((_, index) => this.#session.curves[index]));
	columns = $derived(this.curves.map(({ points }, index) => ({ letter: this.letters[index], points })));
	drawn = $derived(
		drawnChoices(
			this.choices.map(({ name }, index) => ({
				name,
				points: this.curves[index].points,
				previous: this.curves[index].previous,
				uncertain: this.#session.bands[index].points
			})),
			this.quantity,
			this.quantities.solid,
			this.against,
			this.shape
		)
	);
	/** Signs as the engine has them: what is drawn solid may be the positive one. */
	sources = $derived(
		this.drawn.map(({ letter, ink, series }) => ({
			letter,
			ink,
			series:
				this.quantities.solid === -1 ? series : { ...series, values: series.values.map((value) => -value) }
		}))
	);

	equilibria = $derived(
		this.curves.flatMap(({ equilibria }, index) =>
			equilibria.map((found) => ({ ...found, letter: this.letters[index] }))
		)
	);
	warnings = $derived(
		this.curves.flatMap(({ warnings }, index) => {
			// Of the same arrangement: only what is said of its uncertainty is new.
			const ofBand = this.#session.bands[index].warnings.filter(({ code }) => code === 'uncertainty-order');
			return [...warnings, ...ofBand].map(({ text }) => ({ text, letter: this.letters[index] }));
		})
	);
	issues = $derived(this.curves.flatMap(({ problem }) => problem?.issues ?? []));
	/** Trouble that no field can show, one list a choice. */
	problems = $derived(
		this.curves.map(({ problem }) => {
			if (!problem) return [];
			const rest = otherMessages(problem.issues);
			const wait = problem.retryAfter ? [`Tried again in ${problem.retryAfter} s.`] : [];
			return problem.issues.length > 0 && rest.length === 0 ? [] : [problem.message, ...rest, ...wait];
		})
	);
	checksums = $derived(
		this.curves.flatMap(({ checksum }, index) =>
			checksum === '' ? [] : [{ letter: this.letters[index], checksum }]
		)
	);
	complete = $derived(this.curves.every(({ state }) => state === 'complete'));

	readings = $derived.by(() => this.#readingsAt(this.#session.atNm));
	parked = $derived(this.parkedNm === undefined ? [] : this.#readingsAt(this.parkedNm));
	differences = $derived.by(() =>
		differencesFrom(this.parked, this.parkedNm ?? 0, this.readings, this.#session.atNm)
	);
	/** Read aloud by the hairline. */
	valueText = $derived.by(() =>
		[
			quantityLine(this.#session.atNm, this.lengthScale),
			...this.readings.map(
				({ letter, value }) => `choice ${letter} ${quantityLine(value, this.scale)}, ${this.word(value)}`
			)
		].join('; ')
	);

	used = $derived(ingredients(this.study, this.facts, this.letters));
	conduction = $derived(conductionOfAll(this.study, this.facts, this.letters));
	/** How the static term is taken in each choice, to stand beside its number. */
	conductionBeside = $derived(
		this.choices.map((choice) => conductionWords(this.study, choice, this.facts).join('; '))
	);
	titleFacts = $derived.by((): TitleFacts => ({
		heading: quantityHeading(this.quantity, this.shape),
		atNm: this.#session.atNm,
		spread: spreadOf(this.readings),
		ingredients: this.used,
		conduction: this.conduction,
		reliance: relianceWords(this.used, this.#session.atNm),
		conditions: conditionWords(this.study, shapeName(this.shape.kind)),
		engine: this.curves[0].engine,
		computedAt: this.curves[0].computedAt,
		worst: worstState(this.used.map(({ facts }) => facts)),
		percent: (share) => percent(share)
	}));
	query = $derived(encodeStudy(this.study));

	word = (value: number): string => quantityWord(this.quantities, value);

	#readingsAt(atNm: number): Reading[] {
		return this.sources.flatMap((source, index) => {
			const reading = readingAt(source, this.#session.exact[index].points, this.quantity, atNm);
			if (!reading) return [];
			const deviations = deviationsOf(
				this.#session.bands[index].points,
				this.quantity,
				isPerLength(this.shape)
			);
			const deviation = deviations === null ? undefined : deviationAt(deviations, atNm);
			return [{ ...reading, deviation, stale: !this.curves[index].fresh }];
		});
	}
}
