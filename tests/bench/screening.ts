import { screeningKernel } from '../../src/lib/engine/index.ts';
import type { MaterialModel } from '../../src/lib/engine/contract.ts';
import { tableOf } from './arrangements.ts';

/** Tabulated materials that differ: bodies by the strength of their bands, liquids by two relaxations. */
export function screeningMaterials(bodies: number, media: number): MaterialModel[] {
	return [
		...Array.from({ length: bodies }, (_, i): MaterialModel => ({
			permittivity: tableOf(400, 1 + i / bodies, i % 2 === 0),
			...(i % 2 === 0 ? { zeroFrequency: 'drude' as const } : {})
		})),
		...Array.from({ length: media }, (_, i): MaterialModel => ({
			permittivity: tableOf(400, 0.1 + (0.4 * i) / media, false)
		}))
	];
}

/** Every pair of bodies, unordered, across every medium; stops after `triples`. */
export function screen(
	materials: readonly MaterialModel[],
	bodies: number,
	triples: number
): { triples: number; met: number } {
	const kernel = screeningKernel(materials, 300, 1e-6);
	let done = 0;
	let met = 0;
	for (let left = 0; left < bodies; left++) {
		for (let right = left; right < bodies; right++) {
			for (let medium = bodies; medium < materials.length; medium++) {
				if (done === triples) return { triples: done, met };
				const bare = (substrate: number) => ({ layers: [], substrate });
				const points = kernel.pressures({ left: bare(left), medium, right: bare(right) }, SEPARATIONS_NM);
				met += points.filter((point) => point.met).length;
				done++;
			}
		}
	}
	return { triples: done, met };
}

const SEPARATIONS_NM = [5, 20, 80, 300, 1000];
