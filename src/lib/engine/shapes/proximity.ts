import type { Shape } from '../contract.ts';
import { metresFromUm } from '../units.ts';

/** How a shape turns plates into a force (methods.md section 5). */
export type ShapeRule =
	| { kind: 'plates' }
	/** Force factor * F, gradient -factor * P; factor in m. */
	| { kind: 'point'; factor: number; radius: number; curvature: number; coefficient: number }
	/** Per length: sqrt(2 radius d) int P(d (1 + s^2)) ds, and the same with dP/dd. */
	| { kind: 'line'; radius: number; curvature: number; coefficient: number };

/**
 * Scale of the proximity approximation's own error, as coefficient * d * curvature: ideal conductors at T = 0 in the
 * derivative expansion (Fosco, Lombardo and Mazzitelli 2011; Teo 2013), force of a sphere 0.85 d/R, cylinder 0.5 d/R.
 */
const POINT_COEFFICIENT = 0.85;
const LINE_COEFFICIENT = 0.5;

const parallel = (a: number, b: number): number => (a * b) / (a + b);

/**
 * Proximity rule of a shape; radii in the contract's um become m. Two spheres add the small term d/(R1 + R2) of the
 * derivative expansion; crossed cylinders stand at a right angle.
 */
export function shapeRule(shape: Shape): ShapeRule {
	const point = (radius: number, curvature: number): ShapeRule => ({
		kind: 'point',
		factor: 2 * Math.PI * radius,
		radius,
		curvature,
		coefficient: POINT_COEFFICIENT
	});
	const line = (radius: number): ShapeRule => ({
		kind: 'line',
		radius,
		curvature: 1 / radius,
		coefficient: LINE_COEFFICIENT
	});
	switch (shape.kind) {
		case 'plates':
			return { kind: 'plates' };
		case 'spherePlate': {
			const radius = metresFromUm(shape.radiusUm);
			return point(radius, 1 / radius);
		}
		case 'spheres': {
			const [a, b] = [metresFromUm(shape.leftRadiusUm), metresFromUm(shape.rightRadiusUm)];
			return point(parallel(a, b), 1 / a + 1 / b + 0.6 / (a + b));
		}
		case 'crossedCylinders': {
			const [a, b] = [metresFromUm(shape.leftRadiusUm), metresFromUm(shape.rightRadiusUm)];
			return point(Math.sqrt(a * b), Math.max(1 / a, 1 / b));
		}
		case 'cylinderPlate':
			return line(metresFromUm(shape.radiusUm));
		case 'parallelCylinders':
			return line(parallel(metresFromUm(shape.leftRadiusUm), metresFromUm(shape.rightRadiusUm)));
	}
}

/**
 * Estimate of the relative error of the proximity approximation for the force; doubled where the n = 0 term carries
 * more than half, whose corrections do not vanish linearly in d/R.
 *
 * @param zeroShare  share of the n = 0 term in the quantity the force rests on
 */
export function shapeError(rule: ShapeRule, separation: number, zeroShare: number): number | undefined {
	if (rule.kind === 'plates') return undefined;
	return rule.coefficient * separation * rule.curvature * (zeroShare > 0.5 ? 2 : 1);
}
