import type { MaterialModel, PermittivityModel } from '$lib/engine/contract.ts';

/** Models made of parts, drawn at random: fitted bands, index formulae, mixtures, laws of temperature. */

const between = (random: () => number, from: number, to: number): number => from + (to - from) * random();
const logBetween = (random: () => number, from: number, to: number): number => from * (to / from) ** random();
const pick = <T>(random: () => number, choices: readonly T[]): T =>
	choices[Math.floor(random() * choices.length)];

function oxide(random: () => number): PermittivityModel {
	return {
		kind: 'ninhamParsegian',
		terms: [
			{ strength: logBetween(random, 0.05, 5), frequencyRadPerS: logBetween(random, 3e13, 6e14) },
			{ strength: between(random, 0.5, 4), frequencyRadPerS: logBetween(random, 8e15, 2.5e16) }
		]
	};
}

function freeCarriers(random: () => number): PermittivityModel {
	const plasmaEnergyEv = logBetween(random, 0.5, 15);
	return random() < 0.7
		? { kind: 'drude', plasmaEnergyEv, dampingEv: logBetween(random, 0.003, 0.5) }
		: { kind: 'plasma', plasmaEnergyEv };
}

function spreadOscillators(random: () => number): PermittivityModel {
	const terms = Array.from({ length: 1 + Math.floor(3 * random()) }, () => {
		const energyEv = logBetween(random, 0.3, 25);
		return {
			strengthEv2: logBetween(random, 0.05, 3) * energyEv ** 2,
			energyEv,
			dampingEv: energyEv * between(random, 0.005, 0.3),
			widthEv: energyEv * between(random, 0.05, 0.25)
		};
	});
	return { kind: 'sum', of: [freeCarriers(random), { kind: 'brendelBormann', terms }] };
}

function bands(random: () => number): PermittivityModel {
	const terms = Array.from({ length: 1 + Math.floor(2 * random()) }, () => {
		const energyEv = between(random, 2.5, 9);
		return {
			amplitudeEv: logBetween(random, 5, 200),
			energyEv,
			broadeningEv: energyEv * between(random, 0.2, 0.9),
			gapEv: between(random, 0.5, 2.4),
			transitionEv: between(random, 0.5, 3)
		};
	});
	return random() < 0.5
		? { kind: 'codyLorentz', terms }
		: { kind: 'taucLorentz', terms: terms.map(({ transitionEv: _transition, ...term }) => term) };
}

function indexFormula(random: () => number): PermittivityModel {
	return {
		kind: 'sellmeier',
		constant: 0,
		bandUm: { from: 0.36, to: 0.7 },
		terms: [
			{ strength: between(random, 0.3, 1.5), wavelengthUm: between(random, 0.05, 0.2) },
			{ strength: between(random, 0.3, 2), wavelengthUm: between(random, 6, 20) }
		]
	};
}

/** Away from the threshold of Bruggeman's rule, where the static limit hangs on the last digit. */
function fractionOf(random: () => number): number {
	const fraction = between(random, 0.02, 0.98);
	return [1 / 3, 2 / 3].some((mark) => Math.abs(fraction - mark) < 0.02) ? 0.5 : fraction;
}

function mixture(random: () => number): PermittivityModel {
	const phase = () => (random() < 0.7 ? oxide(random) : freeCarriers(random));
	return {
		kind: pick(random, ['maxwellGarnett', 'bruggeman'] as const),
		host: phase(),
		inclusion: phase(),
		fraction: fractionOf(random)
	};
}

function warmMetal(random: () => number): PermittivityModel {
	return {
		kind: 'temperatureDependent',
		of: { kind: 'drude', plasmaEnergyEv: between(random, 5, 12), dampingEv: 0.03 },
		rangeK: { from: 50, to: 800 },
		laws: [
			{
				parameter: 'dampingEv',
				law: {
					kind: 'blochGruneisen',
					value: between(random, 0.02, 0.1),
					referenceK: 300,
					debyeK: between(random, 100, 450),
					residualShare: between(random, 0, 0.3)
				}
			}
		]
	};
}

export function composedSolid(random: () => number): PermittivityModel {
	return pick(random, [spreadOscillators, bands, indexFormula, mixture, mixture, warmMetal])(random);
}

export function composedLiquid(random: () => number): PermittivityModel {
	if (random() < 0.4)
		return { kind: 'maxwellGarnett', host: oxide(random), inclusion: oxide(random), fraction: 0.2 };
	return {
		kind: 'temperatureDependent',
		of: {
			kind: 'sum',
			of: [{ kind: 'debye', terms: [{ strength: 70, relaxationTimePs: 9 }] }, oxide(random)]
		},
		rangeK: { from: 273, to: 373 },
		laws: [
			{
				parameter: 'of[0].terms[0].strength',
				law: { kind: 'polynomial', coefficients: [between(random, 80, 90), -0.4, 0.0008], scale: 'celsius' }
			},
			{
				parameter: 'of[0].terms[0].relaxationTimePs',
				law: { kind: 'arrhenius', value: 8.3, referenceK: 298.15, activationK: between(random, 1500, 2500) }
			}
		]
	};
}

/** A place made uniaxial, covered with a conducting sheet, or both. */
export function dressed(random: () => number, material: MaterialModel): MaterialModel {
	const roll = random();
	const normal = { permittivity: random() < 0.8 ? oxide(random) : composedSolid(random) };
	const siemens = logBetween(random, 1e-6, 1e-2);
	const sheet =
		random() < 0.5
			? { kind: 'constant' as const, siemens }
			: { kind: 'drude' as const, siemens, dampingEv: logBetween(random, 1e-3, 1) };
	return { ...material, ...(roll < 0.7 ? { normal } : {}), ...(roll > 0.45 ? { sheet } : {}) };
}
