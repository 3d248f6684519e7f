import { choiceLetter, materialAt } from '../../schemas/study-slots.ts';
import type { ModelChoice, Study } from '../../schemas/study.ts';
import type { VersionFacts } from '../../study-sheet/version-facts.ts';
import { ruleWords } from '../../study-sheet/conduction.ts';

/** What a model choice changes, in words. */

/** A place as people name it; layers are counted from the gap. */
export function placeWords(slot: string): string {
	if (slot === 'medium') return 'medium';
	const side = slot.startsWith('left') ? 'left' : 'right';
	const layer = slot.slice(side.length);
	return layer === '' ? `${side} body` : `layer ${layer} of the ${side} body`;
}

function capital(text: string): string {
	return text.slice(0, 1).toUpperCase() + text.slice(1);
}

/** One phrase a change; none where the choice is the arrangement as it stands. */
export function changeWords(
	study: Study,
	choice: ModelChoice,
	facts: Record<string, VersionFacts>
): string[] {
	const phrases = Object.entries(choice.changes).flatMap(([slot, { version, zeroFrequency }]) => {
		const base = materialAt(study, slot);
		if (!base) return [];
		const said: string[] = [];
		const named = facts[version ?? base.version];
		const name = named?.material.name ?? version ?? base.version;
		if (version !== undefined && version !== base.version) {
			const sameMaterial = named && named.material.slug === facts[base.version]?.material.slug;
			const what = sameMaterial ? name : `${placeWords(slot)} ${name}`;
			said.push(`${what}: ${named ? `${named.datasetTitle}, version ${named.number}` : version}`);
		}
		if (zeroFrequency === 'written') said.push(`${name}: static term as written`);
		else if (zeroFrequency !== undefined) said.push(`${name}: static term ${ruleWords(zeroFrequency)}`);
		return said;
	});
	if (choice.debyeLengthNm === 'none') phrases.push('no ions');
	else if (choice.debyeLengthNm === 'off') phrases.push('static term of the ions left out');
	else if (choice.debyeLengthNm !== undefined) phrases.push(`Debye length ${choice.debyeLengthNm} nm`);
	return phrases.map(capital);
}

/** Beside a place of the arrangement: which choices fill it otherwise. */
export function overrideWords(study: Study, slot: string): string | undefined {
	const letters = study.choices.flatMap(({ changes }, index) => (changes[slot] ? [choiceLetter(index)] : []));
	if (letters.length === 0) return undefined;
	return `otherwise in choice ${letters.join(', ')}`;
}
