import type { PermittivityModel, TemperatureLaw } from '$lib/engine/contract.ts';
import {
	add,
	divide,
	multiply,
	negate,
	toDoubleDouble,
	toNumber,
	type DoubleDouble
} from './slow-lifshitz-double-double.ts';
import { gaussLegendre } from './slow-lifshitz-quadrature.ts';

/**
 * Fitted bands, mixtures and laws of temperature once more, by other roads than the engine's: the mean over a normal
 * distribution and the Kramers-Kronig integrals by quadrature in stretched variables, mixing rules in their textbook form
 * with 32 digits, laws by the path of their parameter.
 */

type Spread = Extract<PermittivityModel, { kind: 'brendelBormann' }>['terms'][number];
type Band = Extract<PermittivityModel, { kind: 'taucLorentz' | 'codyLorentz' }>;
type Sellmeier = Extract<PermittivityModel, { kind: 'sellmeier' }>;
type Mixture = Extract<PermittivityModel, { kind: 'maxwellGarnett' | 'bruggeman' }>;

/** Mean of f/(x^2 + b^2) over x ~ N(w0, s) with x = b sinh t; at xi = 0 over x > w0/5 alone. Energies in eV. */
export function spreadSusceptibility(term: Spread, xiEv: number): number {
	const { strengthEv2: f, energyEv: w0, dampingEv: gamma, widthEv: s } = term;
	const normal = (x: number) => Math.exp(-(((x - w0) / s) ** 2) / 2) / (s * Math.sqrt(2 * Math.PI));
	if (xiEv === 0) {
		const rule = gaussLegendre(12);
		const [from, to] = [Math.max(w0 / 5, w0 - 9.5 * s), w0 + 9.5 * s];
		const panels = 400;
		const half = (to - from) / panels / 2;
		let sum = 0;
		for (let p = 0; p < panels; p++)
			rule.nodes.forEach((node, i) => {
				const x = from + half * (2 * p + 1 + node);
				sum += (half * rule.weights[i] * normal(x)) / (x * x);
			});
		return f * sum;
	}
	const b = Math.sqrt(xiEv * (xiEv + gamma));
	// the bell is s/sqrt(w0^2 + b^2) wide in t: far above the resonance it is the narrower the larger xi
	const step = 0.05 * Math.min(1, s / Math.hypot(w0, b));
	const reach = Math.asinh((w0 + 9.5 * s) / b);
	const low = -Math.min(reach, 45);
	let sum = 0;
	for (let t = low; t <= reach; t += step) sum += normal(b * Math.sinh(t)) / Math.cosh(t);
	return (f / b) * step * sum;
}

const bands = new Map<string, { squares: Float64Array; strengths: Float64Array }>();

/** (2/pi) int E eps''/(E^2 + xi^2) dE with E = gap + e^u; broadenings of a fifth of the energies and more. */
export function bandSusceptibility(model: Band, index: number, xiEv: number): number {
	const key = JSON.stringify([model, index]);
	const known = bands.get(key) ?? bandNodes(model, index);
	bands.set(key, known);
	let sum = 0;
	for (let i = 0; i < known.squares.length; i++) sum += known.strengths[i] / (known.squares[i] + xiEv * xiEv);
	return sum;
}

function bandNodes(model: Band, index: number): { squares: Float64Array; strengths: Float64Array } {
	const term = model.terms[index];
	const { amplitudeEv: A, energyEv: E0, broadeningEv: C, gapEv: Eg } = term;
	const epsilon2 = (E: number): number => {
		const lorentz = (A * E0 * C * E) / ((E * E - E0 * E0) ** 2 + C * C * E * E);
		const onset =
			model.kind === 'taucLorentz'
				? (E - Eg) ** 2 / (E * E)
				: (E - Eg) ** 2 / ((E - Eg) ** 2 + model.terms[index].transitionEv ** 2);
		return lorentz * onset;
	};
	const rule = gaussLegendre(14);
	const squares: number[] = [];
	const strengths: number[] = [];
	const middle = Math.log(E0);
	for (let u = middle - 20; u < middle + 42; u += 0.1) {
		rule.nodes.forEach((node, i) => {
			const above = Math.exp(u + 0.05 * (1 + node));
			const E = Eg + above;
			squares.push(E * E);
			strengths.push((2 / Math.PI) * 0.05 * rule.weights[i] * above * E * epsilon2(E));
		});
	}
	return { squares: Float64Array.from(squares), strengths: Float64Array.from(strengths) };
}

const TWO_PI_C = 2 * Math.PI * 299792458;

/** Infrared poles and the pair of the Cauchy plot over 36 wavelengths, by the normal equations of a line. */
export function sellmeierSusceptibility({ terms, constant, bandUm }: Sellmeier, radPerS: number): number {
	const infrared = terms.filter(({ wavelengthUm }) => wavelengthUm > bandUm.to);
	const ultraviolet = terms.filter(({ wavelengthUm }) => wavelengthUm <= bandUm.to);
	let total = 0;
	for (const { strength, wavelengthUm } of infrared)
		total += strength / (1 + (radPerS * wavelengthUm * 1e-6) ** 2 / TWO_PI_C ** 2);
	const points = Array.from({ length: 36 }, (_, i) => bandUm.from + ((bandUm.to - bandUm.from) * i) / 35);
	const y = points.map((lambda) =>
		ultraviolet.reduce(
			(sum, { strength, wavelengthUm }) => sum + (strength * lambda ** 2) / (lambda ** 2 - wavelengthUm ** 2),
			constant
		)
	);
	if (y.every((value) => value === 0)) return total;
	const middle = points[18];
	const x = y.map((value, i) => value * (middle / points[i]) ** 2);
	const sums = [0, 1, 2].map((power) => x.reduce((sum, one) => sum + one ** power, 0));
	const right = [0, 1].map((power) => x.reduce((sum, one, i) => sum + y[i] * one ** power, 0));
	const determinant = sums[0] * sums[2] - sums[1] ** 2;
	const intercept = (right[0] * sums[2] - right[1] * sums[1]) / determinant;
	const slope = (sums[0] * right[1] - sums[1] * right[0]) / determinant;
	return total + intercept / (1 + slope * ((radPerS * middle * 1e-6) / TWO_PI_C) ** 2);
}

const dd = toDoubleDouble;
const subtract = (a: DoubleDouble, b: DoubleDouble) => add(a, negate(b));

/** eps - 1 of a mixture from eps - 1 of its phases. */
export function mixtureSusceptibility(
	{ kind, fraction }: Pick<Mixture, 'kind' | 'fraction'>,
	host: DoubleDouble,
	inclusion: DoubleDouble
): DoubleDouble {
	const f = dd(fraction);
	const [h, i] = [add(dd(1), host), add(dd(1), inclusion)];
	if (kind === 'maxwellGarnett') {
		const beta = multiply(f, divide(subtract(inclusion, host), add(i, add(h, h))));
		// eps_h (1 + 2 beta)/(1 - beta) - 1
		return add(host, divide(multiply(multiply(dd(3), h), beta), subtract(dd(1), beta)));
	}
	// Newton's steps on the textbook equation for eps - 1, from the best that doubles can do.
	const [a, b, share] = [toNumber(host), toNumber(inclusion), fraction];
	const linear = 3 - (2 - 3 * share) * a - (3 * share - 1) * b;
	const last = 3 * ((1 - share) * a + share * b) + a * b;
	const root = Math.sqrt(linear ** 2 + 8 * last);
	let x = dd(linear > 0 ? (2 * last) / (linear + root) : (root - linear) / 4);
	for (let step = 0; step < 3; step++) {
		const eps = add(dd(1), x);
		const part = (weight: DoubleDouble, chi: DoubleDouble, own: DoubleDouble): [DoubleDouble, number] => {
			const below = add(own, add(eps, eps));
			const value = divide(multiply(weight, subtract(chi, x)), below);
			return [value, (-3 * toNumber(weight) * toNumber(own)) / toNumber(below) ** 2];
		};
		const [one, slopeOne] = part(subtract(dd(1), f), host, h);
		const [two, slopeTwo] = part(f, inclusion, i);
		x = subtract(x, divide(add(one, two), dd(slopeOne + slopeTwo)));
	}
	return x;
}

/** Growth of eps of a mixture at xi -> 0 where only carriers count: amplitudes of host and inclusion in like units. */
export function mixtureCarriers({ kind, fraction: f }: Mixture, host: number, inclusion: number): number {
	if (f === 0) return host;
	if (f === 1) return inclusion;
	if (kind === 'maxwellGarnett') {
		if (host === 0) return 0;
		const beta = (f * (inclusion - host)) / (inclusion + 2 * host);
		return (host * (1 + 2 * beta)) / (1 - beta);
	}
	const b = (2 - 3 * f) * host + (3 * f - 1) * inclusion;
	return (b + Math.sqrt(b * b + 8 * host * inclusion)) / 4;
}

export function slowLaw(law: TemperatureLaw, kelvin: number): number {
	if (law.kind === 'polynomial') {
		const t = kelvin - (law.scale === 'celsius' ? 273.15 : 0);
		return law.coefficients.reduce((sum, coefficient, power) => sum + coefficient * t ** power, 0);
	}
	if (law.kind === 'arrhenius')
		return law.value * Math.exp(law.activationK / kelvin) * Math.exp(-law.activationK / law.referenceK);
	const rule = gaussLegendre(20);
	const phonons = (temperature: number): number => {
		const end = law.debyeK / temperature;
		let sum = 0;
		for (let panel = 0; panel < 40; panel++)
			rule.nodes.forEach((node, i) => {
				const x = ((panel + (1 + node) / 2) * end) / 40;
				sum += ((rule.weights[i] / 2) * (end / 40) * x ** 5) / (Math.expm1(x) * -Math.expm1(-x));
			});
		return sum / end ** 5;
	};
	return (
		law.value * (law.residualShare + ((1 - law.residualShare) * phonons(kelvin)) / phonons(law.referenceK))
	);
}

/** The model with its laws put in as numbers at a temperature, held at the ends of their range. */
export function slowAtTemperature(model: PermittivityModel, kelvin: number): PermittivityModel {
	if (model.kind === 'sum') return { ...model, of: model.of.map((part) => slowAtTemperature(part, kelvin)) };
	if (model.kind === 'maxwellGarnett' || model.kind === 'bruggeman')
		return {
			...model,
			host: slowAtTemperature(model.host, kelvin),
			inclusion: slowAtTemperature(model.inclusion, kelvin)
		};
	if (model.kind !== 'temperatureDependent') return model;
	const held = Math.max(model.rangeK.from, Math.min(model.rangeK.to, kelvin));
	const copy: unknown = JSON.parse(JSON.stringify(model.of));
	for (const { parameter, law } of model.laws) {
		const keys = parameter.match(/[A-Za-z0-9]+/g) ?? [];
		let holder = copy as Record<string, unknown>;
		for (const key of keys.slice(0, -1)) holder = holder[key] as Record<string, unknown>;
		holder[keys[keys.length - 1]] = slowLaw(law, held);
	}
	return copy as PermittivityModel;
}
