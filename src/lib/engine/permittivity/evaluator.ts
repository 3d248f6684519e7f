import type { PermittivityModel } from '../contract.ts';
import { Refusal } from '../refusal.ts';
import { radPerSFromEv, secondsFromPs } from '../units.ts';
import { permittivityIssues } from '../validate-permittivity.ts';
import { brendelBormann } from './brendel-bormann.ts';
import { codyLorentz } from './cody-lorentz.ts';
import { constant } from './constant.ts';
import { dcConductivity } from './dc-conductivity.ts';
import { debye } from './debye.ts';
import { drude } from './drude.ts';
import { imaginaryTable } from './imaginary-table.ts';
import { lorentz } from './lorentz.ts';
import { bruggeman, maxwellGarnett } from './mixtures.ts';
import { ninhamParsegian } from './ninham-parsegian.ts';
import { plasma } from './plasma.ts';
import { sellmeier } from './sellmeier.ts';
import { addLimits, type Susceptibility } from './susceptibility.ts';
import { table } from './table.ts';
import { taucLorentz } from './tauc-lorentz.ts';

/** Susceptibilities add (methods.md section 7). */
function sum(parts: readonly Susceptibility[]): Susceptibility {
	if (parts.length === 1) return parts[0];
	const real = parts.map(({ atOmega }) => atOmega);
	return {
		atXi: (xi) => {
			let total = 0;
			for (let i = 0; i < parts.length; i++) total += parts[i].atXi(xi);
			return total;
		},
		atOmega: real.every((one) => one !== null)
			? (omega) => {
					const values = real.map((one) => one(omega));
					return {
						re: values.reduce((total, { re }) => total + re, 0),
						im: values.reduce((total, { im }) => total + im, 0)
					};
				}
			: null,
		atZero: addLimits(parts.map(({ atZero }) => atZero)),
		knots: [...new Set(parts.flatMap(({ knots }) => knots))].sort((a, b) => a - b),
		ulps: Math.max(0, ...parts.map(({ ulps }) => ulps)) + Math.min(parts.length, 8)
	};
}

/**
 * A model of the contract as a susceptibility in SI units. The model has been checked before; an ideal conductor has
 * no permittivity and is treated by reflection alone.
 *
 * @throws RangeError for `idealConductor`
 */
export function susceptibility(model: PermittivityModel): Susceptibility {
	switch (model.kind) {
		case 'vacuum':
			return constant(1);
		case 'constant':
			return constant(model.value);
		case 'drude':
			return drude(radPerSFromEv(model.plasmaEnergyEv), radPerSFromEv(model.dampingEv));
		case 'plasma':
			return plasma(radPerSFromEv(model.plasmaEnergyEv));
		case 'lorentz':
			return sum(
				model.terms.map(({ strengthEv2, energyEv, dampingEv }) =>
					lorentz(strengthEv2 * radPerSFromEv(1) ** 2, radPerSFromEv(energyEv), radPerSFromEv(dampingEv))
				)
			);
		case 'debye':
			return sum(model.terms.map((term) => debye(term.strength, secondsFromPs(term.relaxationTimePs))));
		case 'ninhamParsegian':
			return sum(model.terms.map((term) => ninhamParsegian(term.strength, term.frequencyRadPerS)));
		case 'dcConductivity':
			return dcConductivity(model.siemensPerM);
		case 'table':
			return table(model);
		case 'imaginaryTable':
			return imaginaryTable(model.frequenciesRadPerS, model.epsilon);
		case 'brendelBormann':
			return sum(
				model.terms.map(({ strengthEv2, energyEv, dampingEv, widthEv }) =>
					brendelBormann(
						strengthEv2 * radPerSFromEv(1) ** 2,
						radPerSFromEv(energyEv),
						radPerSFromEv(dampingEv),
						radPerSFromEv(widthEv)
					)
				)
			);
		case 'taucLorentz':
			return sum(
				model.terms.map(({ amplitudeEv, energyEv, broadeningEv, gapEv }) =>
					taucLorentz(
						radPerSFromEv(amplitudeEv),
						radPerSFromEv(energyEv),
						radPerSFromEv(broadeningEv),
						radPerSFromEv(gapEv)
					)
				)
			);
		case 'codyLorentz':
			return sum(
				model.terms.map(({ amplitudeEv, energyEv, broadeningEv, gapEv, transitionEv }) =>
					codyLorentz(
						radPerSFromEv(amplitudeEv),
						radPerSFromEv(energyEv),
						radPerSFromEv(broadeningEv),
						radPerSFromEv(gapEv),
						radPerSFromEv(transitionEv)
					)
				)
			);
		case 'sellmeier':
			return sum(sellmeier(model));
		case 'sum':
			return sum(model.of.map(susceptibility));
		case 'maxwellGarnett':
			return maxwellGarnett(susceptibility(model.host), susceptibility(model.inclusion), model.fraction);
		case 'bruggeman':
			return bruggeman(susceptibility(model.host), susceptibility(model.inclusion), model.fraction);
		case 'temperatureDependent':
			return susceptibility(model.of);
		case 'idealConductor':
			throw new RangeError('an ideal conductor has no permittivity');
	}
}

function checked(model: PermittivityModel): Susceptibility {
	const issues = permittivityIssues(model, 'permittivity');
	if (model.kind === 'idealConductor') {
		issues.push({
			path: 'permittivity.kind',
			message: 'an ideal conductor has no permittivity, only a reflection'
		});
	}
	if (issues.length > 0) throw new Refusal(issues);
	return susceptibility(model);
}

/**
 * eps(i xi) of a model, for xi > 0 in rad/s; monotone and >= 1 for every passive model.
 *
 * @throws Refusal for an invalid model or an ideal conductor
 */
export function permittivityOnImaginaryAxis(model: PermittivityModel): (xi: number) => number {
	const { atXi } = checked(model);
	return (xi) => 1 + atXi(xi);
}

/**
 * eps'(omega) and eps''(omega) of a model, omega > 0 in rad/s: closed forms; for tables the interpolant and its
 * principal-value Kramers-Kronig transform.
 *
 * @throws Refusal for an invalid model, an ideal conductor, and a table on the imaginary axis (which says nothing here)
 */
export function permittivityOnRealAxis(
	model: PermittivityModel
): (omega: number) => { epsRe: number; epsIm: number } {
	const { atOmega } = checked(model);
	if (atOmega === null) {
		throw new Refusal([
			{
				path: 'permittivity.kind',
				message:
					'values at imaginary frequency say nothing about the real axis: use a table of eps"(omega) there'
			}
		]);
	}
	return (omega) => {
		const { re, im } = atOmega(omega);
		return { epsRe: 1 + re, epsIm: im };
	};
}
