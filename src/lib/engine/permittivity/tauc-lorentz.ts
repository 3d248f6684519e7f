import { gapped, resonancePoles } from './gapped.ts';
import type { Susceptibility } from './susceptibility.ts';

/**
 * Absorption of amorphous matter above a gap (Jellison and Modine 1996):
 *
 *     eps'' = A w0 C (w - wg)^2/{w [(w^2 - w0^2)^2 + C^2 w^2]},   w > wg
 *
 * @param amplitude   A in rad/s, > 0
 * @param resonance   w0 in rad/s, > 0
 * @param broadening  C in rad/s, > 0
 * @param gap         wg in rad/s, > 0
 */
export function taucLorentz(
	amplitude: number,
	resonance: number,
	broadening: number,
	gap: number
): Susceptibility {
	const factor = amplitude * resonance * broadening;
	return gapped({
		edge: gap,
		density: (w) => {
			const above = w - gap;
			const a = (w - resonance) * (w + resonance);
			const b = broadening * w;
			return (factor * above * above) / (a * a + b * b);
		},
		poles: resonancePoles(resonance, broadening)
	});
}
