import type { ZeroFrequencyRule } from '../../engine/contract.ts';
import { CHOICES_MAX } from '../../schemas/study-limits.ts';
import { materialIn, slotsOf, withMaterial } from '../../schemas/study-slots.ts';
import type {
	ModelChoice,
	Side,
	SlotChange,
	SlotMaterial,
	Study,
	StudyLayer,
	StudyMark
} from '../../schemas/study.ts';

/** Edits of a study: each answers a new one and leaves the old as it was, so that undo is a list of studies. */

export type Edit = (study: Study) => Study;

/** Rewrites the places that the choices name; a place that maps to undefined has gone, and its change with it. */
function renamed(choices: ModelChoice[], rename: (slot: string) => string | undefined): ModelChoice[] {
	return choices.map((choice) => {
		const changes: Record<string, SlotChange> = {};
		for (const [slot, change] of Object.entries(choice.changes)) {
			const now = rename(slot);
			if (now !== undefined) changes[now] = change;
		}
		return { ...choice, changes };
	});
}

/** Puts the layers of a side into a new order; `order` lists the old positions, -1 a layer that was not there. */
function withLayers(study: Study, side: Side, layers: StudyLayer[], order: readonly number[]): Study {
	const pattern = new RegExp(`^${side}(\\d+)$`);
	const rename = (slot: string) => {
		const position = pattern.exec(slot)?.[1];
		if (position === undefined) return slot;
		const now = order.indexOf(Number(position) - 1);
		return now < 0 ? undefined : `${side}${now + 1}`;
	};
	return { ...study, [side]: { ...study[side], layers }, choices: renamed(study.choices, rename) };
}

const positions = (layers: readonly StudyLayer[]) => layers.map((_, index) => index);

/** A layer on the surface, next to the gap. */
export function addLayer(side: Side, layer: StudyLayer): Edit {
	return (study) => {
		const { layers } = study[side];
		return withLayers(study, side, [layer, ...layers], [-1, ...positions(layers)]);
	};
}

export function removeLayer(side: Side, index: number): Edit {
	return (study) => {
		const order = positions(study[side].layers).filter((position) => position !== index);
		return withLayers(
			study,
			side,
			order.map((position) => study[side].layers[position]),
			order
		);
	};
}

export function moveLayer(side: Side, from: number, to: number): Edit {
	return (study) => {
		const { layers } = study[side];
		if (to < 0 || to >= layers.length || from === to) return study;
		const order = positions(layers).filter((position) => position !== from);
		order.splice(to, 0, from);
		return withLayers(
			study,
			side,
			order.map((position) => layers[position]),
			order
		);
	};
}

export function setThickness(side: Side, index: number, thicknessNm: number): Edit {
	return (study) => {
		const layers = study[side].layers.map((layer, at) => (at === index ? { ...layer, thicknessNm } : layer));
		return { ...study, [side]: { ...study[side], layers } };
	};
}

/**
 * Another material at a place. Rule and choices that spoke of the old one go with it: a choice that kept the old
 * substance would show no change where the reader just made one.
 */
export function setMaterial(slot: string, version: string): Edit {
	return (study) => ({
		...withMaterial(study, slot, { version }),
		choices: renamed(study.choices, (place) => (place === slot ? undefined : place))
	});
}

/** Another version of the same material: rule and choices stay. */
export function setVersion(slot: string, material: SlotMaterial, version: string): Edit {
	return (study) => withMaterial(study, slot, { ...material, version });
}

/** How the static term of a conductor is taken; undefined for the limit of its model as written. */
export function setRule(slot: string, material: SlotMaterial, rule: ZeroFrequencyRule | undefined): Edit {
	const { zeroFrequency: _rule, ...kept } = material;
	return (study) => withMaterial(study, slot, rule === undefined ? kept : { ...kept, zeroFrequency: rule });
}

/** What lies along the normal of a place; undefined for an isotropic one. */
export function setNormal(slot: string, material: SlotMaterial, normal: string | undefined): Edit {
	const { normal: _normal, ...kept } = material;
	return (study) => withMaterial(study, slot, normal === undefined ? kept : { ...kept, normal });
}

/** A conducting sheet on a place; undefined for none. */
export function setSheet(slot: string, material: SlotMaterial, sheetSiemens: number | undefined): Edit {
	const { sheetSiemens: _sheet, ...kept } = material;
	return (study) => withMaterial(study, slot, sheetSiemens === undefined ? kept : { ...kept, sheetSiemens });
}

export function swapBodies(): Edit {
	return (study) => ({
		...study,
		left: study.right,
		right: study.left,
		choices: renamed(study.choices, (slot) =>
			slot.replace(/^(left|right)/, (side) => (side === 'left' ? 'right' : 'left'))
		)
	});
}

const OPTIONAL = ['debyeLengthNm', 'salt', 'ions', 'roughness', 'dataUncertainty'] as const;

/** The ions of the arrangement, one statement in the place of another. */
export const setIons = (ions: Pick<Study, 'debyeLengthNm' | 'salt' | 'ions'>): Edit =>
	setConditions({ debyeLengthNm: undefined, salt: undefined, ions: undefined, ...ions });

/** rms of one surface; a smooth one has none, and two smooth ones no roughness at all. */
export function setRoughness(side: Side, rmsNm: number | undefined): Edit {
	return (study) => {
		const heights = { ...study.roughness, [`${side}Nm`]: rmsNm };
		const { leftNm, rightNm } = heights;
		const smooth = leftNm === undefined && rightNm === undefined;
		const roughness = {
			...(leftNm === undefined ? {} : { leftNm }),
			...(rightNm === undefined ? {} : { rightNm })
		};
		return setConditions({ roughness: smooth ? undefined : roughness })(study);
	};
}

/** Fields of the whole arrangement. A quantity that a new shape does not have falls back to pressure. */
export function setConditions(
	fields: Partial<
		Pick<
			Study,
			| 'shape'
			| 'temperatureK'
			| 'debyeLengthNm'
			| 'salt'
			| 'ions'
			| 'roughness'
			| 'dataUncertainty'
			| 'fromNm'
			| 'toNm'
			| 'quantity'
			| 'against'
		>
	>
): Edit {
	return (study) => {
		const next = { ...study, ...fields };
		for (const field of OPTIONAL) if (next[field] === undefined) delete next[field];
		if (next.shape.kind === 'plates' && next.quantity === 'force') next.quantity = 'pressure';
		const inside = (value: number) => Math.min(next.toNm, Math.max(next.fromNm, value));
		next.atNm = inside(next.atNm);
		if (next.parkedNm !== undefined) next.parkedNm = inside(next.parkedNm);
		return next;
	};
}

/** A further choice that begins as the last one. */
export function addChoice(): Edit {
	return (study) => {
		if (study.choices.length >= CHOICES_MAX) return study;
		const last = study.choices[study.choices.length - 1];
		return { ...study, choices: [...study.choices, { ...last, name: '' }] };
	};
}

export function removeChoice(index: number): Edit {
	return (study) => {
		if (study.choices.length === 1) return study;
		const { against } = study;
		const shifted = typeof against === 'number' && against > index ? against - 1 : against;
		return {
			...study,
			choices: study.choices.filter((_, at) => at !== index),
			against: against === index ? 'ideal' : shifted
		};
	};
}

function withChoice(study: Study, index: number, change: (choice: ModelChoice) => ModelChoice): Study {
	return { ...study, choices: study.choices.map((choice, at) => (at === index ? change(choice) : choice)) };
}

export function renameChoice(index: number, name: string): Edit {
	return (study) => withChoice(study, index, (choice) => ({ ...choice, name }));
}

/** What a choice changes at a place; an empty change takes the place back to the arrangement's. */
export function setChange(index: number, slot: string, change: SlotChange): Edit {
	return (study) =>
		withChoice(study, index, (choice) => {
			const changes = { ...choice.changes };
			if (change.version === undefined && change.zeroFrequency === undefined) delete changes[slot];
			else changes[slot] = change;
			return { ...choice, changes };
		});
}

export function setChoiceIons(index: number, debyeLengthNm: ModelChoice['debyeLengthNm']): Edit {
	return (study) =>
		withChoice(study, index, ({ name, changes }) => ({
			name,
			changes,
			...(debyeLengthNm === undefined ? {} : { debyeLengthNm })
		}));
}

/** Two choices that differ in nothing but how the static term of every conductor is taken. */
export function addConductionPair(slots: readonly string[]): Edit {
	return (study) => {
		if (study.choices.length + 2 > CHOICES_MAX || slots.length === 0) return study;
		const choice = (name: string, zeroFrequency: ZeroFrequencyRule): ModelChoice => ({
			name,
			changes: Object.fromEntries(slots.map((slot) => [slot, { zeroFrequency }]))
		});
		return { ...study, choices: [...study.choices, choice('Drude', 'drude'), choice('Plasma', 'plasma')] };
	};
}

/** A newer version of an input, set beside the present one as a further choice. */
export function addSuccessor(version: string, successor: string): Edit {
	return (study) => {
		if (study.choices.length >= CHOICES_MAX) return study;
		const grown = addChoice()(study);
		const index = grown.choices.length - 1;
		const places = slotsOf(grown).filter(
			(slot) => materialIn(grown, grown.choices[index], slot)?.version === version
		);
		const change = (next: Study, slot: string) =>
			setChange(index, slot, { ...next.choices[index].changes[slot], version: successor })(next);
		return places.reduce(change, renameChoice(index, `with ${successor}`)(grown));
	};
}

/** The reader's own marks on the ruler. */
export function setMarks(marks: StudyMark[]): Edit {
	return (study) => ({ ...study, marks });
}
