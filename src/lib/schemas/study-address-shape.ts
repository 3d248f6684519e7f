import type { Shape } from '../engine/contract.ts';
import { shape as shapeSchema } from './arrangement.ts';
import { radiusFields, SHAPE_KINDS } from './study-encode.ts';

/** A shape in an address: `spherePlate:100`, `spheres:50,80`; radii in micrometres. */

export function decodeShape(text: string): Shape | string {
	const [kind, radii = ''] = text.split(':');
	const known = SHAPE_KINDS.find((name) => name === kind);
	if (!known) return `"${kind}" is not a shape (${SHAPE_KINDS.join(', ')})`;
	const fields = radiusFields(known);
	const values = radii === '' ? [] : radii.split(',').map(Number);
	const parsed = shapeSchema.safeParse({
		kind,
		...Object.fromEntries(fields.map((field, index) => [field, values[index]]))
	});
	if (parsed.success && values.length === fields.length) return parsed.data;
	return `the shape "${text}" needs ${fields.length === 1 ? 'one radius' : `${fields.length} radii`} in micrometres`;
}
