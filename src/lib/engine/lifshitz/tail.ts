import { valueOf, type Tally } from './tally.ts';

/** The sum ends where its tail is this share of the accuracy asked for, or of the rounding of all terms. */
const TAIL_SHARE = 0.05;
const TAIL_ROUNDING = 2 ** -56;

/** Beyond this y0 every exponential is zero in double precision. */
export const LARGEST_PHASE = 745;

/** Tails are judged by the fall of magnitude from octave to octave, never trusted to fall faster than this. */
const FASTEST_FALL = 0.02;
const SLOWEST_FALL = 0.9;
const TAIL_SAFETY = 4;
const PROBE_SAFETY = 1.5;

/** Judges what follows the octaves of frequencies summed so far. */
export interface TailJudge {
	/**
	 * @param size   magnitudes of the octave just summed, for F, P and G
	 * @param start  y0 where it begins
	 * @param next   y0 where the next one begins
	 */
	octave(size: Float64Array, start: number, next: number): void;
	/** Bound on the sum of all later octaves; infinite while nothing can be said. */
	tail(quantity: number): number;
	/** Whether later octaves may be left out at the accuracy asked for. */
	smallEnough(tally: Tally, accuracy: number): boolean;
	/** Looks at the terms where the next two octaves begin, each as large as if all its octave were; raises the tail. */
	probe(first: Float64Array, second: Float64Array): void;
}

/**
 * Magnitudes fall from octave to octave by a factor that itself falls: powers of xi steepen towards xi^-4 and
 * exponentials e^-y0 double their steps. Two things can hide a slower fall and are allowed for: a change of sign inside
 * the last octave, and a medium whose permittivity drops, so that y0 grows less than before. Before a tail is believed,
 * two terms inside it are looked at.
 */
export function tailJudge(): TailJudge {
	const sizes = [new Float64Array(3), new Float64Array(3), new Float64Array(3)];
	const starts = [0, 0];
	const probed = new Float64Array(3);
	let next = 0;
	let seen = 0;
	const tail = (q: number): number => Math.max(geometric(q), probed[q]);
	const geometric = (q: number): number => {
		const now = sizes[0][q];
		const before = sizes[1][q];
		const earlier = sizes[2][q];
		if (now === 0 && before === 0) return seen >= 2 ? 0 : Infinity;
		if (seen < 3) return Infinity;
		const slower = Math.exp(Math.max(0, starts[0] - starts[1] - (next - starts[0])));
		const fall = Math.max(FASTEST_FALL, (now / before) * slower, before / earlier / 2);
		return fall < SLOWEST_FALL ? (TAIL_SAFETY * now * fall) / (1 - fall) : Infinity;
	};
	return {
		octave(size, start, following) {
			sizes[2].set(sizes[1]);
			sizes[1].set(sizes[0]);
			sizes[0].set(size);
			starts[1] = starts[0];
			starts[0] = start;
			next = following;
			probed.fill(0);
			seen++;
		},
		tail,
		probe(first, second) {
			for (let q = 0; q < 3; q++) {
				const fall = Math.min(SLOWEST_FALL, first[q] === 0 ? SLOWEST_FALL : second[q] / first[q]);
				probed[q] = PROBE_SAFETY * (first[q] + second[q] / (1 - fall));
			}
		},
		smallEnough(tally, accuracy) {
			for (let q = 0; q < 3; q++) {
				const wanted = TAIL_SHARE * accuracy * Math.abs(valueOf(tally, q));
				if (!(tail(q) <= Math.max(wanted, TAIL_ROUNDING * tally.magnitude[q]))) return false;
			}
			return true;
		}
	};
}
