import type { Spectrum, VersionDetail } from '$lib/schemas/version.ts';
import { onImaginaryAxis, spectrum } from '$lib/server/library/spectrum.ts';

/**
 * Spectra of versions, kept once sampled: a version never changes, and a table takes a good part of a second because the
 * principal value runs over all of its points for every sample.
 */

const KEPT_MAX = 200;
const kept = new Map<string, Promise<Spectrum>>();

export function sampled(ref: string): Promise<Spectrum> {
	const found = kept.get(ref);
	if (found !== undefined) {
		// The last used stays longest.
		kept.delete(ref);
		kept.set(ref, found);
		return found;
	}
	const asked = spectrum(ref);
	kept.set(ref, asked);
	asked.catch(() => kept.delete(ref));
	const [oldest] = kept.keys();
	if (kept.size > KEPT_MAX) kept.delete(oldest);
	return asked;
}

/** Nine figures are more than a drawing or a comparison needs, and half the weight of the page. */
const shortened = (values: readonly number[]) => values.map((value) => Number(value.toPrecision(9)));

/** What a page draws at once: the imaginary axis. The real axis is asked for when its plot comes into view. */
export async function drawnAtOnce(ref: string) {
	const { imaginary, measuredRangeEv, real } = await sampled(ref);
	return { measuredRangeEv, hasRealAxis: real !== null, imaginary: shortenedAxis(imaginary) };
}

/** Of a version that is not public yet, or may change: sampled anew each time, the imaginary axis alone. */
export function drawnAsIs({ model, measuredRangeEv }: Pick<VersionDetail, 'model' | 'measuredRangeEv'>) {
	return { measuredRangeEv, hasRealAxis: false, imaginary: shortenedAxis(onImaginaryAxis(model)) };
}

function shortenedAxis({ xiRadPerS, epsilon, shares }: Spectrum['imaginary']): Spectrum['imaginary'] {
	return {
		xiRadPerS: shortened(xiRadPerS),
		epsilon: shortened(epsilon),
		shares: shares && {
			below: shortened(shares.below),
			inside: shortened(shares.inside),
			above: shortened(shares.above)
		}
	};
}
