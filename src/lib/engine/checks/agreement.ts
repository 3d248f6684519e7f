import { matsubaraFrequency } from '../lifshitz/matsubara.ts';
import { permittivityOnImaginaryAxis } from '../permittivity/evaluator.ts';
import type { PermittivityModel } from '../contract.ts';
import { percent, type Check } from './check.ts';

/**
 * Largest difference in eps(i xi) from the nearest other version that stands without a word. Real samples of one metal differ by 10 to
 * 25 % (methods sheet and reference tables); a slipped unit or a wrong column differs by factors.
 */
export const AGREEMENT_THRESHOLD = 0.3;

/** Frequencies of 300 K that carry forces from nanometres to micrometres. */
const TERMS = [1, 2, 3, 5, 8, 13, 21, 34, 55, 89];
const TEMPERATURE_K = 300;

/** How far eps(i xi) lies from what the library has of the same material already; only where it has anything. */
export const agreement: Check = ({ model, others = [] }) => {
	const comparable = others.filter((other) => hasCurve(other.model));
	if (comparable.length === 0 || !hasCurve(model)) return null;
	const distances = comparable
		.map((other) => ({ ref: other.ref, distance: distanceBetween(model, other.model) }))
		.sort((a, b) => a.distance - b.distance);
	const nearest = distances[0];
	const farthest = distances[distances.length - 1];
	const apart = nearest.distance > AGREEMENT_THRESHOLD;
	const rest =
		distances.length > 1 ? `, ${percent(farthest.distance)} from ${farthest.ref}, the farthest` : '';
	return {
		code: 'agreement',
		severity: apart ? 'warn' : 'info',
		message: apart
			? `eps(i xi) differs by up to ${percent(nearest.distance)} from ${nearest.ref}, the nearest of ${distances.length} other published versions${rest}.`
			: `eps(i xi) agrees with ${nearest.ref}, the nearest of ${distances.length} other published versions, to ${percent(nearest.distance)}${rest}.`,
		figure: nearest.distance,
		threshold: AGREEMENT_THRESHOLD
	};
};

const hasCurve = ({ kind }: PermittivityModel): boolean => kind !== 'idealConductor' && kind !== 'vacuum';

/** Largest |eps/eps' - 1| over the frequencies, the larger of the two over the smaller. */
function distanceBetween(first: PermittivityModel, second: PermittivityModel): number {
	const [a, b] = [permittivityOnImaginaryAxis(first), permittivityOnImaginaryAxis(second)];
	return Math.max(
		...TERMS.map((term) => {
			const xi = matsubaraFrequency(term, TEMPERATURE_K);
			const ratio = a(xi) / b(xi);
			return Math.max(ratio, 1 / ratio) - 1;
		})
	);
}
