import type { PermittivityModel, TemperatureLaw } from '../contract.ts';
import { withParameter } from '../analysis/model-parameters.ts';
import { gaussRule } from '../numerics/gauss-rule.ts';

export type ThermalModel = Extract<PermittivityModel, { kind: 'temperatureDependent' }>;

const RULE = gaussRule(16, Infinity);

/** x^5 e^-x is below 1e-25 from here on. */
const FADED = 80;

/**
 * A parameter at a temperature, in the unit of the parameter:
 *
 * - `polynomial`: sum c_j t^j, t in K or in degrees Celsius;
 * - `arrhenius`: value exp[B (1/T - 1/T_ref)], a relaxation time;
 * - `blochGruneisen`: value times [r + (1 - r) J(T)/J(T_ref)], J(T) = (T/Theta)^5 int_0^{Theta/T} x^5/[(e^x - 1)(1 - e^-x)] dx, the
 *   damping of a metal by phonons (Gruneisen 1933) on top of the share r that defects leave at every temperature.
 *
 * @param kelvin  > 0
 */
export function lawAt(law: TemperatureLaw, kelvin: number): number {
	switch (law.kind) {
		case 'polynomial': {
			const t = law.scale === 'celsius' ? kelvin - 273.15 : kelvin;
			return law.coefficients.reduceRight((sum, coefficient) => sum * t + coefficient, 0);
		}
		case 'arrhenius':
			return law.value * Math.exp(law.activationK * (1 / kelvin - 1 / law.referenceK));
		case 'blochGruneisen': {
			const phonons = phononScattering(kelvin / law.debyeK) / phononScattering(law.referenceK / law.debyeK);
			return law.value * (law.residualShare + (1 - law.residualShare) * phonons);
		}
	}
}

/** t^5 int_0^{1/t} x^5/[(e^x - 1)(1 - e^-x)] dx; poles at 2 pi i, so panels of length one and 16 nodes give 1e-15. */
function phononScattering(t: number): number {
	const end = Math.min(1 / t, FADED);
	const panels = Math.ceil(end);
	const half = end / panels / 2;
	let sum = 0;
	for (let panel = 0; panel < panels; panel++) {
		for (let i = 0; i < RULE.nodes.length; i++) {
			const x = half * (2 * panel + 1 + RULE.nodes[i]);
			const sine = 2 * Math.sinh(x / 2);
			sum += (2 * half * RULE.weights[i] * x ** 5) / (sine * sine);
		}
	}
	return t ** 5 * sum;
}

/** Outside its range a model is held at the nearest end: a law continued says nothing. */
export const heldTemperature = ({ rangeK }: ThermalModel, kelvin: number): number =>
	Math.min(rangeK.to, Math.max(rangeK.from, kelvin));

/** True where the temperature lies outside what the model is meant for. */
export const outsideRange = ({ rangeK }: ThermalModel, kelvin: number): boolean =>
	kelvin < rangeK.from || kelvin > rangeK.to;

/**
 * A model with its laws carried out: the parameters stand at their values, paths to them stay what they were.
 *
 * @param kelvin  temperature of the arrangement, >= 0
 */
export function atTemperature(model: PermittivityModel, kelvin: number): PermittivityModel {
	switch (model.kind) {
		case 'sum':
			return { ...model, of: model.of.map((part) => atTemperature(part, kelvin)) };
		case 'maxwellGarnett':
		case 'bruggeman':
			return {
				...model,
				host: atTemperature(model.host, kelvin),
				inclusion: atTemperature(model.inclusion, kelvin)
			};
		case 'temperatureDependent': {
			const held = heldTemperature(model, kelvin);
			const at = model.laws.reduce<PermittivityModel>(
				(of, { parameter, law }) => withParameter(of, parameter, lawAt(law, held)),
				model.of
			);
			return { ...model, of: at, laws: [] };
		}
		default:
			return model;
	}
}

/** Every model inside a model that is none of the wrappers (sum, mixture, temperature). */
export function partsOf(model: PermittivityModel): PermittivityModel[] {
	switch (model.kind) {
		case 'sum':
			return model.of.flatMap(partsOf);
		case 'maxwellGarnett':
		case 'bruggeman':
			return [...partsOf(model.host), ...partsOf(model.inclusion)];
		case 'temperatureDependent':
			return partsOf(model.of);
		default:
			return [model];
	}
}

/** Models with laws of temperature inside a model. */
export function thermalParts(model: PermittivityModel): ThermalModel[] {
	switch (model.kind) {
		case 'sum':
			return model.of.flatMap(thermalParts);
		case 'maxwellGarnett':
		case 'bruggeman':
			return [...thermalParts(model.host), ...thermalParts(model.inclusion)];
		case 'temperatureDependent':
			return [model, ...thermalParts(model.of)];
		default:
			return [];
	}
}
