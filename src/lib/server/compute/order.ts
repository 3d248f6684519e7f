/** A curve of this many points is recognisable; they come first. */
const OVERVIEW = 24;

/**
 * The order in which the points of a curve are computed: evenly spread first, then what lies between, halving the
 * gaps, so that a curve is there as a whole early and only gets finer. A permutation of 0 .. count - 1.
 *
 * @returns the indices, and how many of them make the overview
 */
export function coarseToFine(count: number): { order: number[]; overview: number } {
	let stride = 1;
	while ((count - 1) / (stride * 2) >= OVERVIEW) stride *= 2;
	const order: number[] = [];
	for (let index = 0; index < count; index += stride) order.push(index);
	// The far end belongs to the overview even where the stride steps over it.
	if (count > 0 && order[order.length - 1] !== count - 1) order.push(count - 1);
	const overview = order.length;
	for (let half = stride / 2; half >= 1; half /= 2) {
		for (let index = half; index < count; index += half * 2) {
			if (index !== count - 1 || (count - 1) % stride === 0) order.push(index);
		}
	}
	return { order, overview };
}
