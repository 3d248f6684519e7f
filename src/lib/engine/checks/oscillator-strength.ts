import type { PermittivityModel, SellmeierModel } from '../contract.ts';
import { susceptibility } from '../permittivity/evaluator.ts';
import { isInfrared, ultravioletPair } from '../permittivity/sellmeier.ts';
import { evFromRadPerS, radPerSFromEv, radPerSFromWavelength } from '../units.ts';

const FAR = 1e8;

/**
 * (2/pi) int E eps''(E) dE over all energies, in eV^2: the f-sum of a model, methods.md section 7, check 3. Closed forms
 * give it directly; a table by its log-log segments and ends. Infinite for responses that fall slower than 1/E^2 (Debye,
 * dc conductivity, a constant, an E^-2 tail), null where there is no eps'' to integrate.
 */
export function oscillatorStrength(model: PermittivityModel): number | null {
	switch (model.kind) {
		case 'vacuum':
			return 0;
		case 'drude':
		case 'plasma':
			return model.plasmaEnergyEv ** 2;
		case 'lorentz':
			return model.terms.reduce((sum, term) => sum + term.strengthEv2, 0);
		case 'ninhamParsegian':
			return model.terms.reduce(
				(sum, term) => sum + term.strength * evFromRadPerS(term.frequencyRadPerS) ** 2,
				0
			);
		case 'constant':
			return model.value === 1 ? 0 : Number.POSITIVE_INFINITY;
		case 'debye':
		case 'dcConductivity':
			return Number.POSITIVE_INFINITY;
		case 'table':
			return below(model) + inside(model) + above(model);
		case 'brendelBormann':
			return model.terms.reduce((sum, term) => sum + term.strengthEv2, 0);
		case 'taucLorentz':
		case 'codyLorentz': {
			// Far above every band eps(i xi) - 1 is the strength over xi^2, up to 1e-8 of it.
			const energy = FAR * Math.max(...model.terms.map((term) => Math.max(term.energyEv, term.gapEv)));
			return susceptibility(model).atXi(radPerSFromEv(energy)) * energy ** 2;
		}
		case 'sellmeier':
			return strengthsOf(model).reduce((sum, one) => sum + one, 0);
		case 'temperatureDependent':
			return oscillatorStrength(model.of);
		case 'maxwellGarnett':
		case 'bruggeman': {
			// Far above every resonance the parts add up by volume.
			const [host, inclusion] = [oscillatorStrength(model.host), oscillatorStrength(model.inclusion)];
			if (host === null || inclusion === null) return null;
			return (1 - model.fraction) * host + model.fraction * inclusion;
		}
		case 'sum': {
			const parts = model.of.map(oscillatorStrength);
			return parts.every((part) => part !== null) ? parts.reduce((sum, part) => sum + part, 0) : null;
		}
		case 'idealConductor':
		case 'imaginaryTable':
			return null;
	}
}

/** eV^2, of each oscillator that stands for an index formula. */
function strengthsOf(model: SellmeierModel): number[] {
	const pair = ultravioletPair(model);
	const infrared = model.terms
		.filter(({ wavelengthUm }) => isInfrared(model, wavelengthUm))
		.map(
			({ strength, wavelengthUm }) =>
				strength * evFromRadPerS(radPerSFromWavelength(wavelengthUm * 1e-6)) ** 2
		);
	return pair === null ? infrared : [...infrared, pair.strength * evFromRadPerS(pair.frequency) ** 2];
}

const OVER_PI = 2 / Math.PI;

type Table = Extract<PermittivityModel, { kind: 'table' }>;

function below({ energiesEv: [first], epsilon2: [value], lowEnd }: Table): number {
	switch (lowEnd.kind) {
		case 'drude': {
			const { plasmaEnergyEv: wp, dampingEv: gamma } = lowEnd;
			return OVER_PI * wp ** 2 * Math.atan(first / gamma);
		}
		case 'plasma':
			return lowEnd.plasmaEnergyEv ** 2;
		case 'power':
			return (OVER_PI * value * first ** 2) / (lowEnd.exponent + 2);
		case 'none':
			return 0;
	}
}

function inside({ energiesEv: energies, epsilon2 }: Table): number {
	let sum = 0;
	for (let i = 1; i < energies.length; i++)
		sum += segment(energies[i - 1], epsilon2[i - 1], energies[i], epsilon2[i]);
	return OVER_PI * sum;
}

/** int E eps'' dE over one segment: log-log between positive points, linear where a point is zero. */
function segment(e1: number, y1: number, e2: number, y2: number): number {
	if (y1 > 0 && y2 > 0) {
		const ratio = Math.log(e2 / e1);
		// E^2 eps'' is a power of E too; its exponent may be zero, where the integral is a logarithm.
		const exponent = Math.log(y2 / y1) / ratio + 2;
		const scaled = exponent * ratio;
		return y1 * e1 ** 2 * ratio * (Math.abs(scaled) < 1e-12 ? 1 : Math.expm1(scaled) / scaled);
	}
	const slope = (y2 - y1) / (e2 - e1);
	return ((y1 - slope * e1) * (e2 ** 2 - e1 ** 2)) / 2 + (slope * (e2 ** 3 - e1 ** 3)) / 3;
}

function above({ energiesEv, epsilon2, highEnd }: Table): number {
	if (highEnd.kind === 'none') return 0;
	const last = energiesEv[energiesEv.length - 1];
	const value = epsilon2[epsilon2.length - 1];
	if (value === 0) return 0;
	return highEnd.exponent > 2
		? (OVER_PI * value * last ** 2) / (highEnd.exponent - 2)
		: Number.POSITIVE_INFINITY;
}
