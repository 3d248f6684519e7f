import type { Heights, Roughness } from '../contract.ts';
import type { PlateForces } from '../lifshitz/plates.ts';
import { CUT, cutGaussianRule } from '../numerics/cut-gaussian-rule.ts';
import { metresFromNm } from '../units.ts';

/** Mean planes must be apart by this many times the height that both surfaces' peaks reach together. */
export const PEAK_MULTIPLE = 1.5;

/** Plates below an average are computed finer, so that their bound leaves room for the rule of the average. */
export const ROUGHNESS_SHARE = 0.4;

/** Share of the way from the peaks to contact that the error estimate of the rule looks. */
const LOOK = 0.7;
const MOST_NODES = 30;
const LEAST_NODES = 4;

/** What series of terms of both signs may add together, over the sum of their parts. */
const SERIES_SAFETY = 4;

/** Powers of d with which F, P and G grow fastest towards contact. */
const POWERS = [3, 4, 5] as const;

/** A discrete distribution of heights in m: what both surfaces together take off the separation. */
interface Distribution {
	rise: number[];
	weight: number[];
}

const ROUNDING = 16 * 2 ** -53;

const rmsOf = (heights: Heights | undefined): number => (heights?.kind === 'rms' ? heights.rmsNm : 0);

/** Both rms values make one normal distribution. */
const totalRms = ({ left, right }: Roughness): number => Math.hypot(rmsOf(left), rmsOf(right));

/** Heights about their mean, as a distribution of total weight one; nm. */
function histogramOf(heights: Heights | undefined): Distribution {
	if (heights?.kind !== 'histogram') return { rise: [0], weight: [1] };
	const total = heights.weights.reduce((sum, one) => sum + one, 0);
	const weight = heights.weights.map((one) => one / total);
	const mean = heights.heightsNm.reduce((sum, height, i) => sum + height * weight[i], 0);
	const kept = heights.heightsNm.flatMap((height, i) =>
		weight[i] > 0 ? [{ rise: height - mean, weight: weight[i] }] : []
	);
	return { rise: kept.map(({ rise }) => rise), weight: kept.map((one) => one.weight) };
}

/** Sums of two independent heights; equal sums are one entry. */
function convolved(a: Distribution, b: Distribution): Distribution {
	const sums = new Map<number, number>();
	a.rise.forEach((one, i) =>
		b.rise.forEach((other, j) => {
			const key = Number((one + other).toPrecision(12));
			sums.set(key, (sums.get(key) ?? 0) + a.weight[i] * b.weight[j]);
		})
	);
	const sorted = [...sums].sort(([x], [y]) => x - y);
	return { rise: sorted.map(([rise]) => rise), weight: sorted.map(([, weight]) => weight) };
}

const histograms = ({ left, right }: Roughness): Distribution =>
	convolved(histogramOf(left), histogramOf(right));

/**
 * Smallest distance of the mean planes that is averaged at, nm: `PEAK_MULTIPLE` times the height of the peaks of both
 * surfaces together, where a stated rms counts as a normal distribution cut at six standard deviations.
 */
export function closestSeparationNm(roughness: Roughness): number {
	const { rise } = histograms(roughness);
	return PEAK_MULTIPLE * (CUT * totalRms(roughness) + Math.max(...rise));
}

/** Evaluations of plates behind one rough point, for the estimate of cost. */
export function roughnessNodes(roughness: Roughness | undefined): number {
	if (roughness === undefined) return 1;
	return (totalRms(roughness) > 0 ? 14 : 1) * histograms(roughness).rise.length;
}

/**
 * Free energy, pressure and gradient averaged over independent heights of both surfaces (methods.md section 6):
 *
 *     <P>(d) = sum_ij w_i w_j P(d - h_i - h_j)
 *
 * with d the distance of the mean planes. Holds where heights change over lengths far above d; shorter correlation lengths
 * raise the correction. rms values stand for normal distributions cut at six standard deviations, summed by their own Gauss
 * rule: P is analytic for Re d > 0 and there no larger in magnitude than on the real axis, so a rule of m nodes errs by
 * 4 M rho^-2m/(1 - 1/rho), rho of an ellipse about the heights that stays clear of contact and M the most on it.
 *
 * @param evaluate  plates at a separation in m
 * @returns (separation in m) => averages with a bound that includes the rule's own error
 */
export function roughPlates(
	evaluate: (separation: number) => PlateForces,
	roughness: Roughness,
	accuracy: number
): (separation: number) => PlateForces {
	const sigma = metresFromNm(totalRms(roughness));
	const given = histograms(roughness);
	const steps = given.rise.map(metresFromNm);
	const highest = Math.max(...steps);
	return (separation) => {
		const closest = separation - highest;
		const look = 1 + LOOK * (closest / (CUT * sigma) - 1);
		const rho = look + Math.sqrt(look ** 2 - 1);
		const nearest = closest - look * CUT * sigma;
		const count = sigma === 0 ? 1 : nodesFor(rho, closest / nearest, accuracy);
		const rule = cutGaussianRule(count);
		const sum = newAverage();
		let near: PlateForces | null = null;
		let nearAt = Infinity;
		for (let i = steps.length - 1; i >= 0; i--) {
			for (let j = rule.nodes.length - 1; j >= 0; j--) {
				const at = separation - steps[i] - rule.nodes[j] * sigma;
				const forces = evaluate(at);
				addTo(sum, forces, given.weight[i] * rule.weights[j]);
				if (at >= nearAt) continue;
				nearAt = at;
				near = forces;
			}
		}
		if (sigma > 0 && near !== null) {
			const fall = (4 * rho ** (-2 * count)) / (1 - 1 / rho);
			for (const q of [0, 1, 2] as const)
				sum.bound[q] += fall * SERIES_SAFETY * sizeOf(near, q) * (nearAt / nearest) ** POWERS[q];
		}
		return finished(sum);
	};
}

/** Nodes that bring the error of the rule below a small share of the accuracy. */
function nodesFor(rho: number, growth: number, accuracy: number): number {
	const wanted = Math.log((1e3 * growth ** 5) / accuracy) / (2 * Math.log(rho));
	return Math.min(MOST_NODES, Math.max(LEAST_NODES, Math.ceil(wanted)));
}

interface Average extends PlateForces {
	magnitude: [number, number, number];
	rounding: [number, number, number];
}

const newAverage = (): Average => ({
	value: [0, 0, 0],
	bound: [0, 0, 0],
	parts: new Float64Array(12),
	cancellation: [1, 1, 1],
	roundingShare: [0, 0, 0],
	evaluations: 0,
	magnitude: [0, 0, 0],
	rounding: [0, 0, 0]
});

/** Sum of the magnitudes of the parts of one quantity. */
const sizeOf = ({ parts }: PlateForces, q: number): number =>
	parts.subarray(4 * q, 4 * q + 4).reduce((sum, part) => sum + Math.abs(part), 0);

function addTo(sum: Average, forces: PlateForces, weight: number): void {
	for (const q of [0, 1, 2] as const) {
		sum.value[q] += weight * forces.value[q];
		sum.bound[q] += weight * (forces.bound[q] + ROUNDING * Math.abs(forces.value[q]));
		sum.magnitude[q] += weight * forces.cancellation[q] * Math.abs(forces.value[q]);
		sum.rounding[q] += weight * forces.roundingShare[q] * forces.bound[q];
	}
	forces.parts.forEach((part, i) => (sum.parts[i] += weight * part));
	sum.evaluations += forces.evaluations;
}

function finished({ magnitude, rounding, ...sum }: Average): PlateForces {
	for (const q of [0, 1, 2] as const) {
		sum.cancellation[q] = magnitude[q] === 0 ? 1 : magnitude[q] / Math.abs(sum.value[q]);
		sum.roundingShare[q] = sum.bound[q] === 0 ? 0 : rounding[q] / sum.bound[q];
	}
	return sum;
}
