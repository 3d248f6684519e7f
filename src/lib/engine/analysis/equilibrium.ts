import type { Equilibrium, ForcePoint } from '../contract.ts';
import type { PlateForces } from '../lifshitz/plates.ts';
import { metresFromNm } from '../units.ts';

const MOST_STEPS = 60;
/** Relative width at which the bracket counts as a point. */
const NARROW = 1e-12;

/** The sign of the pressure is known only where the value exceeds its bound. */
const certainSign = ({ pressurePa, errorBound }: ForcePoint): number =>
	errorBound.pressure < 1 ? Math.sign(pressurePa) : 0;

/**
 * Separations at which the pressure of the plates vanishes, between neighbouring points of certain and opposite sign,
 * refined with the engine itself by the Illinois variant of regula falsi. Stable where dP/dd < 0.
 */
export function equilibriaBetween(
	points: readonly ForcePoint[],
	plates: (separation: number) => PlateForces
): Equilibrium[] {
	const known = points
		.filter((point) => certainSign(point) !== 0)
		.sort((a, b) => a.separationNm - b.separationNm);
	const found: Equilibrium[] = [];
	for (let i = 0; i + 1 < known.length; i++) {
		if (certainSign(known[i]) === certainSign(known[i + 1])) continue;
		const separationNm = zeroBetween(known[i], known[i + 1], plates);
		const stiffnessPaPerM = plates(metresFromNm(separationNm)).value[2];
		found.push({ separationNm, stable: stiffnessPaPerM < 0, stiffnessPaPerM });
	}
	return found;
}

function zeroBetween(low: ForcePoint, high: ForcePoint, plates: (separation: number) => PlateForces): number {
	let [a, b] = [low.separationNm, high.separationNm];
	// P falls by powers of d: weighing with d^3 makes the two ends comparable.
	let fa = low.pressurePa * a ** 3;
	let fb = high.pressurePa * b ** 3;
	let moved: 'a' | 'b' | null = null;
	for (let step = 0; step < MOST_STEPS && b - a > NARROW * b; step++) {
		const x = step < MOST_STEPS - 20 ? (a * fb - b * fa) / (fb - fa) : (a + b) / 2;
		if (!(x > a && x < b)) break;
		const { value, bound } = plates(metresFromNm(x));
		const fx = value[1] * x ** 3;
		if (fx === 0 || Math.abs(value[1]) < bound[1]) return x;
		if (fx < 0 === fa < 0) {
			a = x;
			fa = fx;
			// The other end stayed twice: its weight is halved, or it would stay for good.
			if (moved === 'a') fb /= 2;
			moved = 'a';
		} else {
			b = x;
			fb = fx;
			if (moved === 'b') fa /= 2;
			moved = 'b';
		}
	}
	return (a + b) / 2;
}
