import type { ForceRequest, MaterialModel, PermittivityModel } from '../../src/lib/engine/index.ts';

/** Substances of the reference sheet: parameters are exact inputs of its figures. */

const oscillators = (...terms: [strength: number, frequencyRadPerS: number][]): PermittivityModel => ({
	kind: 'ninhamParsegian',
	terms: terms.map(([strength, frequencyRadPerS]) => ({ strength, frequencyRadPerS }))
});

export const vacuum: MaterialModel = { permittivity: { kind: 'vacuum' } };
export const metal: MaterialModel = {
	permittivity: { kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0.035 }
};
export const silica: MaterialModel = { permittivity: oscillators([1.71, 1.88e14], [1.098, 2.033e16]) };
export const water: MaterialModel = {
	permittivity: {
		kind: 'sum',
		of: [
			{ kind: 'debye', terms: [{ strength: 74.8, relaxationTimePs: 1e12 / 1.05e11 }] },
			oscillators([0.85, 4e14], [0.755, 1.899e16])
		]
	}
};
export const bromobenzene: MaterialModel = {
	permittivity: oscillators([2.967, 5.47e14], [1.335, 1.286e16])
};

type Options = Partial<Omit<ForceRequest, 'arrangement'>> & Partial<ForceRequest['arrangement']>;

/** Half-spaces at 298.15 K and 10 nm unless said otherwise. */
export function between(
	left: MaterialModel,
	medium: MaterialModel,
	right: MaterialModel,
	{ separationsNm = [10], relativeAccuracy = 1e-10, include = ['analysis'], ...arrangement }: Options = {}
): ForceRequest {
	return {
		arrangement: {
			left: { layers: [], substrate: left },
			medium,
			right: { layers: [], substrate: right },
			shape: { kind: 'plates' },
			temperatureK: 298.15,
			...arrangement
		},
		separationsNm,
		relativeAccuracy,
		include
	};
}
