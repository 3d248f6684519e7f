import type { Shape } from '../engine/contract.ts';
import { shape as shapeSchema } from './force.ts';

/** A shape in an address: `spherePlate:100`, `spheres:50,80`; radii in micrometres. */

const RADII: Record<Shape['kind'], readonly string[]> = {
	plates: [],
	spherePlate: ['radiusUm'],
	spheres: ['leftRadiusUm', 'rightRadiusUm'],
	crossedCylinders: ['leftRadiusUm', 'rightRadiusUm'],
	cylinderPlate: ['radiusUm'],
	parallelCylinders: ['leftRadiusUm', 'rightRadiusUm']
};

/** The radius fields of a shape, in the order of the address. */
export const radiusFields = (kind: Shape['kind']): readonly string[] => RADII[kind];

export function encodeShape(shape: Shape): string {
	const values: Record<string, string | number> = { ...shape };
	const radii = RADII[shape.kind].map((field) => values[field]);
	return radii.length === 0 ? shape.kind : `${shape.kind}:${radii.join(',')}`;
}

export function decodeShape(text: string): Shape | string {
	const [kind, radii = ''] = text.split(':');
	const fields = Object.hasOwn(RADII, kind) ? RADII[kind as Shape['kind']] : undefined;
	if (!fields) return `"${kind}" is not a shape (${Object.keys(RADII).join(', ')})`;
	const values = radii === '' ? [] : radii.split(',').map(Number);
	const parsed = shapeSchema.safeParse({
		kind,
		...Object.fromEntries(fields.map((field, index) => [field, values[index]]))
	});
	if (parsed.success && values.length === fields.length) return parsed.data;
	return `the shape "${text}" needs ${fields.length === 1 ? 'one radius' : `${fields.length} radii`} in micrometres`;
}
