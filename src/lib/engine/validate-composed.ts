import { parameterAt, withParameter } from './analysis/model-parameters.ts';
import type { PermittivityModel, SellmeierModel, TemperatureLaw } from './contract.ts';
import { ENGINE_LIMITS as limits } from './limits.ts';
import { susceptibility } from './permittivity/evaluator.ts';
import { conducts } from './permittivity/susceptibility.ts';
import { isInfrared, ultravioletPair } from './permittivity/sellmeier.ts';
import { lawAt } from './permittivity/temperature.ts';
import type { Issue } from './refusal.ts';
import { checkRange } from './validate-number.ts';

/** Models made of other models, and index formulae: what their numbers must satisfy together. */

type Inner = (model: PermittivityModel, path: string) => Issue[];
type Mixture = Extract<PermittivityModel, { kind: 'maxwellGarnett' | 'bruggeman' }>;
type Thermal = Extract<PermittivityModel, { kind: 'temperatureDependent' }>;

/** So close to the percolation threshold the static limit is not known. */
const PERCOLATION = 1e-6;

/** Temperatures of its range at which a law is tried. */
const TRIED = 9;

const noPermittivity = (path: string): Issue => ({
	path,
	message: 'an ideal conductor has no permittivity that could be mixed or follow a temperature'
});

export function mixtureIssues(model: Mixture, path: string, inner: Inner): Issue[] {
	const issues: Issue[] = [];
	checkRange(issues, `${path}.fraction`, model.fraction, { min: 0, max: 1 });
	for (const side of ['host', 'inclusion'] as const) {
		const part = model[side];
		if (part.kind === 'idealConductor') issues.push(noPermittivity(`${path}.${side}`));
		else issues.push(...inner(part, `${path}.${side}`));
	}
	if (issues.length > 0 || model.kind !== 'bruggeman') return issues;
	const [host, inclusion] = [model.host, model.inclusion].map((part) =>
		conducts(susceptibility(part).atZero)
	);
	const atThreshold = (fraction: number): boolean => Math.abs(3 * fraction - 1) < PERCOLATION;
	if (host !== inclusion && atThreshold(host ? 1 - model.fraction : model.fraction)) {
		issues.push({
			path: `${path}.fraction`,
			message: 'puts the conducting phase at its threshold of a third, where the static limit is not defined'
		});
	}
	return issues;
}

export function sellmeierIssues(model: SellmeierModel, path: string): Issue[] {
	const issues: Issue[] = [];
	const { terms, bandUm } = model;
	checkRange(issues, `${path}.constant`, model.constant, limits.sellmeierConstant);
	checkRange(issues, `${path}.bandUm.from`, bandUm.from, limits.wavelengthUm, 'um');
	checkRange(issues, `${path}.bandUm.to`, bandUm.to, limits.wavelengthUm, 'um');
	terms.forEach(({ strength, wavelengthUm }, i) => {
		const at = `${path}.terms[${i}]`;
		checkRange(issues, `${at}.strength`, strength, limits.strength);
		checkRange(issues, `${at}.wavelengthUm`, wavelengthUm, limits.wavelengthUm, 'um');
		if (wavelengthUm >= bandUm.from && wavelengthUm <= bandUm.to) {
			issues.push({
				path: `${at}.wavelengthUm`,
				message: `is ${wavelengthUm} um, inside the band where the formula must be transparent`
			});
		}
	});
	if (!(bandUm.to > bandUm.from))
		issues.push({ path: `${path}.bandUm.to`, message: `is ${bandUm.to} um; it must lie above from` });
	const ultraviolet =
		model.constant !== 0 || terms.some(({ wavelengthUm }) => !isInfrared(model, wavelengthUm));
	if (issues.length === 0 && ultraviolet && ultravioletPair(model) === null) {
		issues.push({
			path,
			message: 'has no normal dispersion over its band: no ultraviolet oscillator can stand for it'
		});
	}
	return issues;
}

export function thermalIssues(model: Thermal, path: string, inner: Inner): Issue[] {
	const issues: Issue[] = [];
	const { rangeK, laws } = model;
	if (model.of.kind === 'idealConductor') return [noPermittivity(`${path}.of`)];
	checkRange(issues, `${path}.rangeK.from`, rangeK.from, limits.temperatureK, 'K');
	checkRange(issues, `${path}.rangeK.to`, rangeK.to, limits.temperatureK, 'K');
	if (rangeK.to < rangeK.from)
		issues.push({ path: `${path}.rangeK.to`, message: `is ${rangeK.to} K; it must not lie below from` });
	issues.push(...inner(model.of, `${path}.of`));
	laws.forEach(({ parameter, law }, i) => {
		if (parameterAt(model.of, parameter) === undefined) {
			issues.push({
				path: `${path}.laws[${i}].parameter`,
				message: `"${parameter}" names no number of the model; write it as terms[0].strength`
			});
		}
		issues.push(...lawIssues(law, `${path}.laws[${i}].law`));
	});
	if (issues.length > 0) return issues;
	for (let k = 0; k < TRIED; k++) {
		const kelvin = rangeK.from + ((rangeK.to - rangeK.from) * k) / (TRIED - 1);
		const there = laws.reduce<PermittivityModel>(
			(of, { parameter, law }) => withParameter(of, parameter, lawAt(law, kelvin)),
			model.of
		);
		const found = inner(there, `${path}.of`);
		if (found.length === 0) continue;
		return found.map(({ path: at, message }) => ({
			path: at,
			message: `at ${kelvin.toPrecision(4)} K ${message}`
		}));
	}
	return [];
}

function lawIssues(law: TemperatureLaw, path: string): Issue[] {
	const issues: Issue[] = [];
	if (law.kind === 'polynomial') {
		if (law.coefficients.length === 0 || law.coefficients.some((one) => !Number.isFinite(one)))
			issues.push({ path: `${path}.coefficients`, message: 'needs finite coefficients, the constant first' });
		return issues;
	}
	if (!Number.isFinite(law.value)) issues.push({ path: `${path}.value`, message: 'must be a finite number' });
	checkRange(issues, `${path}.referenceK`, law.referenceK, limits.temperatureK, 'K');
	if (law.kind === 'arrhenius') {
		checkRange(issues, `${path}.activationK`, law.activationK, limits.activationK, 'K');
		return issues;
	}
	checkRange(issues, `${path}.debyeK`, law.debyeK, limits.debyeK, 'K');
	checkRange(issues, `${path}.residualShare`, law.residualShare, { min: 0, max: 1 });
	return issues;
}
