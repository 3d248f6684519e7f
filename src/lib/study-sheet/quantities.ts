import type { Shape } from '../engine/contract.ts';
import type { Quantity } from '../schemas/study.ts';
import type { UnitName } from '../format/units.ts';

/** What the stack can show, and the words of its two signs. */

export interface QuantityFacts {
	label: string;
	unit: UnitName;
	/** The sign whose line is drawn solid. */
	solid: -1 | 1;
	/** On the bars: of the solid sign, of the hollow sign. */
	bars: readonly [string, string];
	/** Beside a value: of the solid sign, of the hollow sign. */
	words: readonly [string, string];
}

const PULL = { solid: -1, bars: ['attracts', 'repels'], words: ['attraction', 'repulsion'] } as const;

const perLength = (shape: Shape) => shape.kind === 'cylinderPlate' || shape.kind === 'parallelCylinders';

export function quantityFacts(quantity: Quantity, shape: Shape): QuantityFacts {
	switch (quantity) {
		case 'pressure':
			return { label: 'Pressure', unit: 'pressure', ...PULL };
		case 'energy':
			return { label: 'Free energy per area', unit: 'energy', ...PULL };
		case 'gradient':
			// dP/dd > 0 goes with a growing pull: it lowers the frequency of a spring, dP/dd < 0 raises it.
			return {
				label: 'Pressure gradient',
				unit: 'gradient',
				solid: 1,
				bars: ['softens', 'stiffens'],
				words: ['softens a spring', 'stiffens a spring']
			};
		case 'force':
			return perLength(shape)
				? { label: 'Force per length', unit: 'lineForce', ...PULL }
				: { label: 'Force', unit: 'force', ...PULL };
	}
}

export function quantityWord({ solid, words }: QuantityFacts, value: number): string {
	if (value === 0) return 'no force';
	return Math.sign(value) === solid ? words[0] : words[1];
}

const SHAPES: Record<Shape['kind'], string> = {
	plates: 'plates',
	spherePlate: 'sphere and plate',
	spheres: 'two spheres',
	crossedCylinders: 'crossed cylinders',
	cylinderPlate: 'cylinder and plate',
	parallelCylinders: 'parallel cylinders'
};

export const shapeName = (kind: Shape['kind']): string => SHAPES[kind];

/** The shape for a heading: pressure, energy and gradient are always those between plates at this separation. */
export function quantityHeading(quantity: Quantity, shape: Shape): string {
	const { label } = quantityFacts(quantity, shape);
	return quantity === 'force' ? `${label}, ${shapeName(shape.kind)}` : `${label} between plates`;
}
