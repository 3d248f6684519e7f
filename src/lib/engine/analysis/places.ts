import type { ArrangementOf, RivalOf } from '../contract.ts';

/** What fills each place of an arrangement, by its path. */
export function materialsByPlace<M>({ left, medium, right }: ArrangementOf<M>): Map<string, M> {
	const found = new Map<string, M>();
	for (const [side, { layers, substrate }] of [
		['left', left],
		['right', right]
	] as const) {
		layers.forEach(({ of }, i) => found.set(`${side}.layers[${i}].of`, of));
		found.set(`${side}.substrate`, substrate);
	}
	return found.set('medium', medium);
}

/** The arrangement with a rival at its places. */
export function withRival<M>(arrangement: ArrangementOf<M>, { places, of }: RivalOf<M>): ArrangementOf<M> {
	const at = (path: string, material: M): M => (places.includes(path) ? of : material);
	const body = (side: 'left' | 'right'): ArrangementOf<M>['left'] => ({
		layers: arrangement[side].layers.map((layer, i) => ({
			...layer,
			of: at(`${side}.layers[${i}].of`, layer.of)
		})),
		substrate: at(`${side}.substrate`, arrangement[side].substrate)
	});
	return {
		...arrangement,
		left: body('left'),
		right: body('right'),
		medium: at('medium', arrangement.medium)
	};
}
