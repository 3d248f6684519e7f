import type { ModelChoice, Side, SlotMaterial, Study } from './study.ts';

/** The places of an arrangement, and what fills them in a model choice. */

/** Letters by which the choices are called everywhere. */
export const choiceLetter = (index: number): string => 'ABCDE'[index] ?? String(index + 1);

/** Every place of an arrangement in the order of the drawing, left to right. */
export function slotsOf(study: Study): string[] {
	const layers = (side: Side) => study[side].layers.map((_, index) => `${side}${index + 1}`);
	return ['left', ...layers('left').reverse(), 'medium', ...layers('right'), 'right'];
}

/** What the arrangement itself puts at a place; undefined where the place does not exist. */
export function materialAt(study: Study, slot: string): SlotMaterial | undefined {
	if (slot === 'medium') return study.medium;
	const side: Side = slot.startsWith('left') ? 'left' : 'right';
	const layer = Number(slot.slice(side.length));
	return layer === 0 ? study[side].substrate : study[side].layers[layer - 1]?.of;
}

/** The arrangement with another material at a place that exists. */
export function withMaterial(study: Study, slot: string, material: SlotMaterial): Study {
	if (slot === 'medium') return { ...study, medium: material };
	const side: Side = slot.startsWith('left') ? 'left' : 'right';
	const layer = Number(slot.slice(side.length));
	if (layer === 0) return { ...study, [side]: { ...study[side], substrate: material } };
	const layers = study[side].layers.map((old, index) =>
		index === layer - 1 ? { ...old, of: material } : old
	);
	return { ...study, [side]: { ...study[side], layers } };
}

/** What a choice puts at a place: the arrangement's material with the choice's change laid over it. */
export function materialIn(study: Study, choice: ModelChoice, slot: string): SlotMaterial | undefined {
	const base = materialAt(study, slot);
	const change = choice.changes[slot];
	if (!base || !change) return base;
	const version = change.version ?? base.version;
	const rule = change.zeroFrequency ?? base.zeroFrequency;
	const { zeroFrequency: _rule, ...kept } = base;
	return rule === undefined || rule === 'written'
		? { ...kept, version }
		: { ...kept, version, zeroFrequency: rule };
}

/** Every version a study names, in the arrangement or in a choice, each once. */
export function versionsOf(study: Study): string[] {
	const named = slotsOf(study).flatMap((slot) => {
		const material = materialAt(study, slot);
		return [material?.version, material?.normal];
	});
	const changed = study.choices.flatMap((choice) =>
		Object.values(choice.changes).map(({ version }) => version)
	);
	return [...new Set([...named, ...changed])].filter((version) => version !== undefined);
}
