import { gapped, resonancePoles } from './gapped.ts';
import type { Susceptibility } from './susceptibility.ts';

/**
 * Absorption of amorphous matter above a gap, with a constant dipole matrix element next to it (Ferlauto et al. 2002,
 * without the exponential tail below the gap: continued to zero frequency it would conduct):
 *
 *     eps'' = (w - wg)^2/[(w - wg)^2 + wp^2] A w0 G w/[(w^2 - w0^2)^2 + G^2 w^2],   w > wg
 *
 * @param amplitude   A in rad/s, > 0
 * @param resonance   w0 in rad/s, > 0
 * @param broadening  G in rad/s, > 0
 * @param gap         wg in rad/s, > 0
 * @param transition  wp in rad/s, > 0: how far above the gap the Lorentz shape takes over
 */
export function codyLorentz(
	amplitude: number,
	resonance: number,
	broadening: number,
	gap: number,
	transition: number
): Susceptibility {
	const factor = amplitude * resonance * broadening;
	return gapped({
		edge: gap,
		density: (w) => {
			const above = (w - gap) * (w - gap);
			const a = (w - resonance) * (w + resonance);
			const b = broadening * w;
			return ((above / (above + transition * transition)) * factor * w * w) / (a * a + b * b);
		},
		poles: [...resonancePoles(resonance, broadening), { re: gap, im: transition }]
	});
}
