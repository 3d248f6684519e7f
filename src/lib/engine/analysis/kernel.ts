import type { Kernel } from '../contract.ts';
import type { PlateForces } from '../lifshitz/plates.ts';
import type { Susceptibility } from '../permittivity/susceptibility.ts';
import { radPerSFromEv, RAD_PER_S_PER_EV } from '../units.ts';
import { summed } from './frequency-rule.ts';
import type { PlaceDerivatives, SeparationResponse } from './sensitivity.ts';

/** Energies of the answer: 1 meV to 1 keV, ten a decade. */
const FROM_EV = 1e-3;
const DECADES = 6;
const PER_DECADE = 10;

/**
 * Kernel over real frequency through Kramers-Kronig (methods.md section 10):
 *
 *     delta P = int K delta eps'' d omega,   K = (2/pi) sum_n [omega/(omega^2 + xi_n^2)] dP/d eps(i xi_n)
 *
 * with the n = 0 term of half weight where it depends on eps(0). Given per eV of hbar omega.
 */
export function kernelOf(
	{ nodes, errorBound }: SeparationResponse,
	place: PlaceDerivatives,
	chi: Susceptibility,
	forces: PlateForces
): Kernel {
	const energiesEv = Array.from(
		{ length: DECADES * PER_DECADE + 1 },
		(_, i) => FROM_EV * 10 ** (i / PER_DECADE)
	);
	const omegas = energiesEv.map(radPerSFromEv);
	let open = 0;
	const row = (quantity: 'freeEnergy' | 'pressure'): number[] => {
		const values = omegas.map((omega) => {
			const kramers = (xi: number): number => omega / (omega * omega + xi * xi);
			const sum = summed(nodes, (i) => kramers(nodes[i].xi) * place[quantity][i]);
			const still = place.static[quantity] / omega;
			const scale = (2 / Math.PI) * RAD_PER_S_PER_EV;
			return { value: scale * (sum.value + still) + 0, error: scale * sum.error };
		});
		const largest = Math.max(...values.map(({ value }) => Math.abs(value)));
		if (largest > 0) open = Math.max(open, ...values.map(({ error }) => error / largest));
		return values.map(({ value }) => value);
	};
	const freeEnergyJPerM2PerEv = row('freeEnergy');
	const pressurePaPerEv = row('pressure');
	const weights = (values: readonly number[], total: number): (number | null)[] =>
		values.map((value, i) => {
			const im = chi.atOmega?.(omegas[i]).im;
			return im === undefined || total === 0 ? null : (energiesEv[i] * value * im) / total + 0;
		});
	return {
		energiesEv,
		freeEnergyJPerM2PerEv,
		pressurePaPerEv,
		freeEnergyWeight: weights(freeEnergyJPerM2PerEv, forces.value[0]),
		pressureWeight: weights(pressurePaPerEv, forces.value[1]),
		errorBound: open + errorBound
	};
}
