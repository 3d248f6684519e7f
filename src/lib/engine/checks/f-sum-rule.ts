import { asText, percent, type Check } from './check.ts';
import { formulaUnit } from './formula.ts';
import { oscillatorStrength } from './oscillator-strength.ts';

/** Electrons counted, as a share of all electrons of the formula, above which the strengths cannot be right. */
export const ELECTRONS_THRESHOLD = 1.1;

/** (hbar*omega_p)^2 in eV^2 of one electron per formula unit, times molar mass over density: hbar^2 e^2 N_A/(eps0 m_e). */
export const ONE_ELECTRON_EV2 = 830.3582;

/**
 * Effective number of electrons per formula unit, N = (f-sum)/(hbar^2 n e^2/(eps0 m)), n the formula units per volume
 * (methods.md, section 7, check 3). A shortfall is normal, since core levels lie above most tables; an excess is not.
 */
export const fSumRule: Check = ({ model, material }) => {
	if (!material.formula || !material.densityGPerCm3) return null;
	const unit = formulaUnit(material.formula);
	const strength = oscillatorStrength(model);
	if (!unit || strength === null || strength === 0) return null;
	const result = { code: 'f-sum-rule', threshold: ELECTRONS_THRESHOLD };
	if (!Number.isFinite(strength)) {
		return {
			...result,
			severity: 'info',
			message:
				'The f-sum of the model does not end (a relaxation, a constant or a slow tail), so electrons cannot be counted.',
			figure: null
		};
	}
	const electrons = (strength * unit.molarMass) / (ONE_ELECTRON_EV2 * material.densityGPerCm3);
	const share = electrons / unit.electrons;
	const excess = share > ELECTRONS_THRESHOLD;
	return {
		...result,
		severity: excess ? 'warn' : 'info',
		message: `The f-sum counts ${asText(electrons)} electrons per formula unit of ${unit.electrons} (${percent(share)})${excess ? '; there cannot be more than all' : ''}.`,
		figure: share
	};
};
