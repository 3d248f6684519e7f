import { asText, type Check } from './check.ts';
import { formulaUnit } from './formula.ts';
import { ONE_ELECTRON_EV2 } from './f-sum-rule.ts';
import { oscillatorStrength } from './oscillator-strength.ts';

/** Middle of a table, in eV, outside which no optical table lies: 1.2 cm down to 0.12 pm in wavelength. */
const LOW_EV = 1e-4;
const HIGH_EV = 1e5;

/** Electrons counted against all: a slip by 1000 in energy moves the count by a million, by 10 by a hundred. */
export const EXCESS_THRESHOLD = 10;

/** eV taken for nm, um for nm and the like: energies or strengths that are off by more than physics allows. */
export const unitSlip: Check = ({ rows, material }) => {
	if (!rows) return null;
	const { energiesEv } = rows;
	const middle = Math.sqrt(energiesEv[0] * energiesEv[energiesEv.length - 1]);
	if (middle < LOW_EV || middle > HIGH_EV) {
		return {
			code: 'unit-slip',
			severity: 'warn',
			message: `The middle of the table lies at ${asText(middle)} eV; optical data lie between ${asText(LOW_EV)} and ${asText(HIGH_EV)} eV. Was the unit of the abscissa right?`,
			figure: middle,
			threshold: middle < LOW_EV ? LOW_EV : HIGH_EV
		};
	}
	const unit = material.formula ? formulaUnit(material.formula) : null;
	const noEnd = { kind: 'none' } as const;
	const strength = oscillatorStrength({
		kind: 'table',
		energiesEv,
		epsilon2: rows.epsilon2,
		lowEnd: noEnd,
		highEnd: noEnd
	});
	if (unit && material.densityGPerCm3 && strength) {
		const share = (strength * unit.molarMass) / (ONE_ELECTRON_EV2 * material.densityGPerCm3 * unit.electrons);
		if (share > EXCESS_THRESHOLD) {
			return {
				code: 'unit-slip',
				severity: 'warn',
				message: `The table alone counts ${asText(share)} times all electrons there are; a factor in the abscissa or in eps'' is likely.`,
				figure: share,
				threshold: EXCESS_THRESHOLD
			};
		}
	}
	return {
		code: 'unit-slip',
		severity: 'info',
		message: `The middle of the table lies at ${asText(middle)} eV, where optical data lie.`,
		figure: middle,
		threshold: HIGH_EV
	};
};
