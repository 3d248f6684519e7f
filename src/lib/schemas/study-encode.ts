import type { Shape } from '../engine/contract.ts';
import type { ModelChoice, SlotMaterial, Study, StudyBody } from './study.ts';
import { WORKED_STUDY } from './study-worked.ts';

/** A study as the query of an address; study-address.ts says how it is written, and reads it. */

const RADII: Record<Shape['kind'], readonly string[]> = {
	plates: [],
	spherePlate: ['radiusUm'],
	spheres: ['leftRadiusUm', 'rightRadiusUm'],
	crossedCylinders: ['leftRadiusUm', 'rightRadiusUm'],
	cylinderPlate: ['radiusUm'],
	parallelCylinders: ['leftRadiusUm', 'rightRadiusUm']
};

export const SHAPE_KINDS = Object.keys(RADII) as Shape['kind'][];

/** The radius fields of a shape, in the order of the address. */
export const radiusFields = (kind: Shape['kind']): readonly string[] => RADII[kind];

/** A shape of this kind with its radii in micrometres. */
export function shapeOf(kind: Shape['kind'], radius: (field: string) => number): Shape {
	switch (kind) {
		case 'plates':
			return { kind };
		case 'spherePlate':
		case 'cylinderPlate':
			return { kind, radiusUm: radius('radiusUm') };
		default:
			return { kind, leftRadiusUm: radius('leftRadiusUm'), rightRadiusUm: radius('rightRadiusUm') };
	}
}

export function encodeShape(shape: Shape): string {
	const values: Record<string, string | number> = { ...shape };
	const radii = RADII[shape.kind].map((field) => values[field]);
	return radii.length === 0 ? shape.kind : `${shape.kind}:${radii.join(',')}`;
}

const rule = (material: SlotMaterial) => (material.zeroFrequency ? `!${material.zeroFrequency}` : '');
const axis = ({ normal }: SlotMaterial) => (normal === undefined ? '' : `*${normal}`);
const sheet = ({ sheetSiemens }: SlotMaterial) => (sheetSiemens === undefined ? '' : `~${sheetSiemens}`);
const encodeMaterial = (material: SlotMaterial) =>
	material.version + axis(material) + sheet(material) + rule(material);

function encodeBody(body: StudyBody): string {
	const layers = body.layers.map(({ of, thicknessNm }) => `${encodeMaterial(of)}:${thicknessNm}nm`);
	return [...layers, encodeMaterial(body.substrate)].join(',');
}

function encodeChoice(choice: ModelChoice): string {
	const name = choice.name.replace(/[%;]/g, encodeURIComponent);
	const changes = Object.entries(choice.changes).map(
		([slot, { version = '', zeroFrequency }]) =>
			`${slot}:${version}${zeroFrequency === undefined ? '' : `!${zeroFrequency}`}`
	);
	const ions = choice.debyeLengthNm === undefined ? [] : [`debye:${choice.debyeLengthNm}`];
	return [name, ...changes, ...ions].join(';');
}

/** Everything is escaped but the few signs that keep an address readable and mean nothing in a query. */
const escaped = (text: string) =>
	encodeURIComponent(text)
		.replace(/%(40|3A|2C|3B)/g, decodeURIComponent)
		.replace(/%20/g, '+');

/** The query of a study, with its question mark. */
export function encodeStudy(study: Study): `?${string}` {
	const parts: [string, string][] = [
		['left', encodeBody(study.left)],
		['medium', encodeMaterial(study.medium)],
		['right', encodeBody(study.right)]
	];
	const add = (name: string, value: string | number | undefined, usual?: string | number) => {
		if (value !== undefined && value !== usual) parts.push([name, String(value)]);
	};
	add('shape', encodeShape(study.shape), 'plates');
	add('T', study.temperatureK);
	add('debye', study.debyeLengthNm);
	add('salt', study.salt && `${study.salt.molPerL},${study.salt.valence}`);
	add('ions', study.ions);
	add('rough', study.roughness && `${study.roughness.leftNm ?? 0},${study.roughness.rightNm ?? 0}`);
	add('uncertainty', study.dataUncertainty);
	for (const choice of study.choices) add('choice', encodeChoice(choice));
	add('from', study.fromNm, WORKED_STUDY.fromNm);
	add('to', study.toNm, WORKED_STUDY.toNm);
	add('show', study.quantity, 'pressure');
	add('against', study.against, 'ideal');
	add('at', study.atNm);
	add('parked', study.parkedNm);
	for (const { label, separationNm } of study.marks) add('mark', `${label}:${separationNm}nm`);
	return `?${parts.map(([name, value]) => `${name}=${escaped(value)}`).join('&')}`;
}
