import type { LogScale } from '../../study-sheet/log-scale.ts';
import { matsubaraXi } from './frequency.ts';

/** The Matsubara frequencies as the teeth of a comb along the axis of log xi. */

export interface Comb {
	teeth: { n: number; x: number; label: string }[];
	/** From here on the teeth stand closer than the eye parts them; null if they never do. */
	solidFrom: number | null;
}

/** Pixels between neighbouring teeth below which they are drawn as one band. */
const CLOSEST = 2.5;
const NAMED = [1, 2, 5, 10];

export function matsubaraComb(temperatureK: number, x: LogScale): Comb {
	const comb: Comb = { teeth: [], solidFrom: null };
	for (let n = 1; ; n++) {
		const xi = matsubaraXi(n, temperatureK);
		if (xi > x.max) return comb;
		if (xi < x.min) continue;
		const place = x.at(xi);
		if (x.at(matsubaraXi(n + 1, temperatureK)) - place < CLOSEST) {
			comb.solidFrom = place;
			return comb;
		}
		comb.teeth.push({ n, x: place, label: NAMED.includes(n) ? String(n) : '' });
	}
}
