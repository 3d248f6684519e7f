import { encodeStudy } from '../../schemas/study-encode.ts';
import { bandSeparations, choiceRequest, closestNm, DETAILS } from '../../schemas/study-request.ts';
import { CHOICES_MAX } from '../../schemas/study-limits.ts';
import type { Study } from '../../schemas/study.ts';
import type { Edit } from '../arrangement/edits.ts';
import { settled } from '../plot/hairline.ts';
import { Curve } from './curves.svelte.ts';

/** A study being worked on: edits with undo, both hairlines, and the computations that follow from them. */

/** Where the address is kept: a new entry of the browser's history, or the present one rewritten. */
export interface AddressBar {
	go(query: `?${string}`, options: { replace: boolean }): void;
	/** The hairline alone has moved: nothing need be loaded. */
	note(query: `?${string}`): void;
}

const UNDO_MAX = 50;
/** Edits of one field that follow each other faster than this are one step back. */
const MERGE_MS = 2000;
/** A hairline at rest for this long is where the reader wants a computed number. */
const REST_MS = 220;

export class StudySession {
	study: Study = $state.raw() as Study;
	/** Apart from the study while it moves: sixty times a second only the hairline changes. */
	atNm = $state(1);
	canUndo = $state(false);
	canRedo = $state(false);
	/** One computation a choice: its curve, and the numbers exactly under the hairlines. */
	readonly curves = Array.from({ length: CHOICES_MAX }, () => new Curve());
	readonly exact = Array.from({ length: CHOICES_MAX }, () => new Curve());

	/** What uncertain data do to each curve, at few separations; only where something is stated or looked at. */
	readonly bands = Array.from({ length: CHOICES_MAX }, () => new Curve());

	/** The long answers for the red hairline, computed while somebody looks at them. */
	readonly details = Array.from({ length: CHOICES_MAX }, () => new Curve());
	detailed = $state(false);

	#bar: AddressBar;
	#past: Study[] = [];
	#future: Study[] = [];
	#merge = { key: '', until: 0 };
	#rest: ReturnType<typeof setTimeout> | undefined;

	constructor(study: Study, bar: AddressBar) {
		this.study = study;
		this.atNm = study.atNm;
		this.#bar = bar;
	}

	/** @param mergeKey  names the field, where typing should be one step of undo and not one a key */
	edit(edit: Edit, mergeKey = ''): void {
		const next = edit({ ...this.study, atNm: settled(this.atNm) });
		const merged = mergeKey !== '' && mergeKey === this.#merge.key && Date.now() < this.#merge.until;
		this.#merge = { key: mergeKey, until: Date.now() + MERGE_MS };
		if (!merged) this.#past = [...this.#past.slice(1 - UNDO_MAX), this.study];
		this.#future = [];
		this.#take(next, merged);
	}

	undo(): void {
		this.#step(this.#past, this.#future);
	}

	redo(): void {
		this.#step(this.#future, this.#past);
	}

	#step(from: Study[], to: Study[]): void {
		const study = from.pop();
		if (!study) return;
		to.push(this.study);
		this.#merge.key = '';
		this.#take(study, false);
	}

	#take(study: Study, replace: boolean): void {
		this.#show(study);
		this.#bar.go(encodeStudy(study), { replace });
	}

	#show(study: Study): void {
		this.study = study;
		this.atNm = study.atNm;
		this.canUndo = this.#past.length > 0;
		this.canRedo = this.#future.length > 0;
	}

	/** The address now means this study: after a link, or the browser's own back and forward. */
	adopt(study: Study): void {
		if (encodeStudy(study) === encodeStudy(this.study)) return;
		this.#past.push(this.study);
		this.#future = [];
		this.#show(study);
	}

	/** Moves the red hairline; the address follows when it rests. */
	move(atNm: number): void {
		this.atNm = atNm;
		clearTimeout(this.#rest);
		this.#rest = setTimeout(() => this.#settle({ ...this.study, atNm: settled(this.atNm) }), REST_MS);
	}

	/** Parks the grey hairline under the red one, or takes it away where it stands there already. */
	park(): void {
		const atNm = settled(this.atNm);
		const { parkedNm, ...rest } = this.study;
		this.#settle(parkedNm === atNm ? { ...rest, atNm } : { ...rest, atNm, parkedNm: atNm });
	}

	#settle(study: Study): void {
		clearTimeout(this.#rest);
		this.study = study;
		this.atNm = study.atNm;
		this.#bar.note(encodeStudy(study));
	}

	/** Asks for every curve that the study needs and lets go of those it no longer has. */
	compute(): void {
		this.curves.forEach((curve, index) => {
			const choice = this.study.choices[index];
			if (choice) curve.ask(choiceRequest(this.study, choice));
			else curve.clear();
		});
	}

	/** Asks how uncertain the data make each curve: where the study assumes something of them, or its details are open. */
	computeBands(): void {
		const wanted = this.detailed || this.study.dataUncertainty !== undefined;
		this.bands.forEach((curve, index) => {
			const choice = this.study.choices[index];
			if (choice && wanted)
				curve.ask(choiceRequest(this.study, choice, bandSeparations(this.study), ['uncertainty']), {
					keepPrevious: false
				});
			else curve.clear();
		});
	}

	/** Numbers exactly under the hairlines, once these are at rest. */
	computeExact(): void {
		const { atNm, parkedNm, choices } = this.study;
		const nearest = closestNm(this.study);
		const wanted = parkedNm === undefined || parkedNm === atNm ? [atNm] : [atNm, parkedNm];
		const separations = wanted.filter((separation) => separation >= nearest).sort((a, b) => a - b);
		this.exact.forEach((curve, index) => {
			const choice = choices[index];
			if (choice && separations.length > 0)
				curve.ask(choiceRequest(this.study, choice, separations), { keepPrevious: false });
			else curve.clear();
		});
	}

	/** Terms, sensitivities and what uncertain data do, at the red hairline once it rests. */
	computeDetails(): void {
		const { atNm, choices } = this.study;
		const wanted = this.detailed && atNm >= closestNm(this.study);
		this.details.forEach((curve, index) => {
			const choice = choices[index];
			if (choice && wanted)
				curve.ask(choiceRequest(this.study, choice, [atNm], DETAILS), { keepPrevious: false });
			else curve.clear();
		});
	}

	stop(): void {
		clearTimeout(this.#rest);
		for (const curve of [...this.curves, ...this.exact, ...this.details, ...this.bands]) curve.clear();
	}
}
