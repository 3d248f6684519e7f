import type { ForceRequest, Heights } from './contract.ts';
import { ENGINE_LIMITS as limits } from './limits.ts';
import type { Issue } from './refusal.ts';
import { closestSeparationNm, PEAK_MULTIPLE } from './shapes/roughness.ts';
import { checkRange } from './validate-number.ts';

/** Heights that make sense, and no separation at which peaks come too near to each other for them to be averaged over. */
export function checkRoughness(
	issues: Issue[],
	request: ForceRequest,
	separationsOf: (separations: ForceRequest['separationsNm']) => number[]
): void {
	const { roughness } = request.arrangement;
	if (roughness === undefined) return;
	const before = issues.length;
	for (const side of ['left', 'right'] as const) {
		const heights = roughness[side];
		if (heights !== undefined) checkHeights(issues, `arrangement.roughness.${side}`, heights);
	}
	// Below, nothing can be said of separations while heights or separations themselves are wrong.
	if (issues.length > before || issues.some(({ path }) => path.startsWith('separationsNm'))) return;
	const closest = closestSeparationNm(roughness);
	const nearest = Math.min(...separationsOf(request.separationsNm));
	if (nearest >= closest) return;
	issues.push({
		path: Array.isArray(request.separationsNm) ? 'separationsNm' : 'separationsNm.from',
		message: `begins at ${nearest} nm; with this roughness the mean planes must be at least ${closest.toPrecision(4)} nm apart, ${PEAK_MULTIPLE} times the height of the peaks: nearer, an average over heights means nothing`
	});
}

function checkHeights(issues: Issue[], path: string, heights: Heights): void {
	if (heights.kind === 'rms') {
		checkRange(issues, `${path}.rmsNm`, heights.rmsNm, limits.roughnessRmsNm, 'nm');
		return;
	}
	const { heightsNm, weights } = heights;
	if (heightsNm.length < 1 || heightsNm.length > limits.heightBins) {
		issues.push({
			path: `${path}.heightsNm`,
			message: `has ${heightsNm.length} bins; the engine takes 1 to ${limits.heightBins}`
		});
		return;
	}
	if (weights.length !== heightsNm.length) {
		issues.push({
			path: `${path}.weights`,
			message: `has ${weights.length} values for ${heightsNm.length} heights`
		});
		return;
	}
	if (heightsNm.some((height) => !Number.isFinite(height) || Math.abs(height) > limits.roughnessRmsNm.max))
		issues.push({
			path: `${path}.heightsNm`,
			message: `must all lie within ${limits.roughnessRmsNm.max} nm of the mean plane`
		});
	if (weights.some((weight) => !(weight >= 0 && weight <= Number.MAX_VALUE)) || weights.every((w) => w === 0))
		issues.push({ path: `${path}.weights`, message: 'must not be negative, and not all zero' });
}
