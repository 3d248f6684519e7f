import type { GroupDefaults } from '../schemas/group-defaults.ts';
import { choiceLetter, materialAt, materialIn, slotsOf, withMaterial } from '../schemas/study-slots.ts';
import type { ModelChoice, SlotMaterial, Study } from '../schemas/study.ts';
import { ruleWords } from './conduction.ts';
import { plainName } from './title-block.ts';
import type { VersionFacts } from './version-facts.ts';

/** What a group agreed to begin with, laid over a study and held against it. */

type Facts = Record<string, VersionFacts>;

/** Whether a rule for the static term is needed at a place: its model conducts, and not ideally. */
function needsRule(material: SlotMaterial | undefined, facts: Facts): material is SlotMaterial {
	const limit = material && facts[material.version]?.staticLimit;
	return limit === 'drude' || limit === 'plasma';
}

const ruleAt = (study: Study, choice: ModelChoice, slot: string, facts: Facts) => {
	const material = materialIn(study, choice, slot);
	if (!needsRule(material, facts)) return undefined;
	return material.zeroFrequency ?? facts[material.version].staticLimit;
};

/** Places of the arrangement whose static term is a matter of choice. */
export const conductorSlots = (study: Study, facts: Facts): string[] =>
	slotsOf(study).filter((slot) => needsRule(materialAt(study, slot), facts));

/** Materials whose static term nobody has decided on, in any choice. */
export function undecided(study: Study, facts: Facts): string[] {
	const open = slotsOf(study).filter((slot) => {
		const base = materialAt(study, slot);
		if (!needsRule(base, facts) || base.zeroFrequency !== undefined) return false;
		return study.choices.some((choice) => choice.changes[slot]?.zeroFrequency === undefined);
	});
	return [
		...new Set(
			open.map((slot) => plainName(facts[materialAt(study, slot)?.version ?? '']?.material.name ?? ''))
		)
	];
}

/** Every conductor of the arrangement taken by this rule; what a choice says for itself stays. */
export function withConduction(study: Study, rule: GroupDefaults['conduction'], facts: Facts): Study {
	return slotsOf(study).reduce((made, slot) => {
		const material = materialAt(made, slot);
		return needsRule(material, facts) ? withMaterial(made, slot, { ...material, zeroFrequency: rule }) : made;
	}, study);
}

/** The arrangement with the group's version in every place that is of gold. */
export function withGold(study: Study, gold: string | null, facts: Facts): Study {
	if (gold === null) return study;
	return slotsOf(study).reduce((made, slot) => {
		const material = materialAt(made, slot);
		return material && facts[material.version]?.material.slug === 'gold'
			? withMaterial(made, slot, { ...material, version: gold })
			: made;
	}, study);
}

/** Where a study differs from what its group agreed on, in words; a choice with its letter. */
export function deviations(study: Study, defaults: GroupDefaults, facts: Facts): string[] {
	const said = new Map<string, Set<string>>();
	const note = (words: string, letter: string) => said.set(words, (said.get(words) ?? new Set()).add(letter));
	study.choices.forEach((choice, index) => {
		for (const slot of slotsOf(study)) {
			const material = materialIn(study, choice, slot);
			const known = material && facts[material.version];
			if (!known) continue;
			if (defaults.gold !== null && known.material.slug === 'gold' && material.version !== defaults.gold)
				note(`${material.version} in the place of ${defaults.gold}`, choiceLetter(index));
			const rule = ruleAt(study, choice, slot, facts);
			if (rule !== undefined && rule !== defaults.conduction)
				note(
					`${plainName(known.material.name)} by ${ruleWords(rule)} in the place of ${ruleWords(defaults.conduction)}`,
					choiceLetter(index)
				);
		}
	});
	const all = study.choices.length;
	const words = [...said].map(([text, letters]) =>
		letters.size === all ? text : `${[...letters].join(', ')}: ${text}`
	);
	return study.temperatureK === defaults.temperatureK
		? words
		: [`${study.temperatureK} K in the place of ${defaults.temperatureK} K`, ...words];
}
