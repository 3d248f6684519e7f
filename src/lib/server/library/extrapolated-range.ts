import type { PermittivityModel } from '../../engine/contract.ts';
import { evFromRadPerS, radPerSFromWavelength } from '../../engine/units.ts';

/** How far beyond its last point a tail, and below its first a free-electron or power end, is drawn. */
const TAIL_FACTOR = 10;

/** hbar/tau of a relaxation time in ps, in eV. */
const relaxationEv = (picoseconds: number): number => evFromRadPerS(1e12 / picoseconds);

const evFromUm = (micrometres: number): number => evFromRadPerS(radPerSFromWavelength(micrometres * 1e-6));

/**
 * Photon energies between which a model has features of its own (resonances, relaxations, dampings, ends of a table):
 * what a range bar draws dotted where nothing is measured. Null where it has none.
 */
export function extrapolatedRange(model: PermittivityModel): { low: number; high: number } | null {
	const energies = features(model).filter((energy) => energy > 0 && Number.isFinite(energy));
	if (energies.length === 0) return null;
	const low = Math.min(...energies);
	const high = Math.max(...energies);
	return low < high ? { low, high } : { low: low / Math.SQRT2, high: high * Math.SQRT2 };
}

function features(model: PermittivityModel): number[] {
	switch (model.kind) {
		case 'drude':
			return [model.dampingEv, model.plasmaEnergyEv];
		case 'plasma':
			return [model.plasmaEnergyEv];
		case 'lorentz':
			return model.terms.map((term) => term.energyEv);
		case 'debye':
			return model.terms.map((term) => relaxationEv(term.relaxationTimePs));
		case 'ninhamParsegian':
			return model.terms.map((term) => evFromRadPerS(term.frequencyRadPerS));
		case 'imaginaryTable':
			return model.frequenciesRadPerS.map(evFromRadPerS);
		case 'table': {
			const first = model.energiesEv[0];
			const last = model.energiesEv[model.energiesEv.length - 1];
			const lowest =
				model.lowEnd.kind === 'drude'
					? model.lowEnd.dampingEv
					: model.lowEnd.kind === 'none'
						? first
						: first / TAIL_FACTOR;
			return [lowest, first, last, model.highEnd.kind === 'none' ? last : last * TAIL_FACTOR];
		}
		case 'brendelBormann':
		case 'taucLorentz':
		case 'codyLorentz':
			return model.terms.map((term) => term.energyEv);
		case 'sellmeier':
			return [model.bandUm.from, model.bandUm.to, ...model.terms.map((term) => term.wavelengthUm)].map(
				evFromUm
			);
		case 'temperatureDependent':
			return features(model.of);
		case 'maxwellGarnett':
		case 'bruggeman':
			return [...features(model.host), ...features(model.inclusion)];
		case 'sum':
			return model.of.flatMap(features);
		default:
			return [];
	}
}
