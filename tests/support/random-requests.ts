import type {
	ArrangementOf,
	BodyOf,
	ForceRequest,
	HighEnd,
	LowEnd,
	MaterialModel,
	PermittivityModel
} from '$lib/engine/contract.ts';
import { composedLiquid, composedSolid, dressed } from './random-composed.ts';

/** Uniform numbers in [0, 1) from a seed: splitmix32, the same on every machine. */
export function seededRandom(seed: number): () => number {
	let state = seed >>> 0;
	return () => {
		state = (state + 0x9e3779b9) >>> 0;
		let z = state;
		z = Math.imul(z ^ (z >>> 16), 0x21f0aaad);
		z = Math.imul(z ^ (z >>> 15), 0x735a2d97);
		return ((z ^ (z >>> 15)) >>> 0) / 4294967296;
	};
}

class Dice {
	constructor(private readonly random: () => number) {}

	chance(share: number): boolean {
		return this.random() < share;
	}

	between(from: number, to: number): number {
		return from + (to - from) * this.random();
	}

	logBetween(from: number, to: number): number {
		return from * (to / from) ** this.random();
	}

	integer(from: number, to: number): number {
		return from + Math.floor(this.random() * (to - from + 1));
	}

	pick<T>(choices: readonly T[]): T {
		return choices[Math.floor(this.random() * choices.length)];
	}
}

/** Silica-, polymer- and oxide-like: one infrared and one ultraviolet oscillator. */
function insulator(dice: Dice): PermittivityModel {
	return {
		kind: 'ninhamParsegian',
		terms: [
			{ strength: dice.logBetween(0.05, 5), frequencyRadPerS: dice.logBetween(3e13, 6e14) },
			{ strength: dice.between(0.5, 4), frequencyRadPerS: dice.logBetween(8e15, 2.5e16) }
		]
	};
}

function oscillators(dice: Dice): PermittivityModel {
	const terms = Array.from({ length: dice.integer(1, 5) }, () => {
		const energyEv = dice.logBetween(0.03, 40);
		return {
			strengthEv2: dice.logBetween(0.05, 4) * energyEv ** 2,
			energyEv,
			dampingEv: energyEv * dice.between(0, 0.8)
		};
	});
	return { kind: 'lorentz', terms };
}

function liquid(dice: Dice): PermittivityModel {
	if (dice.chance(0.5)) return insulator(dice);
	return {
		kind: 'sum',
		of: [
			{
				kind: 'debye',
				terms: [{ strength: dice.logBetween(0.5, 80), relaxationTimePs: dice.logBetween(0.5, 1000) }]
			},
			insulator(dice)
		]
	};
}

function table(dice: Dice, conducting: boolean): PermittivityModel {
	const count = dice.integer(20, 60);
	const first = dice.logBetween(0.02, 0.5);
	const last = dice.logBetween(15, 300);
	const peaks = Array.from({ length: 3 }, () => ({
		centre: dice.logBetween(first, last),
		width: dice.between(0.15, 1),
		height: dice.logBetween(0.1, 8)
	}));
	const energiesEv: number[] = [];
	const epsilon2: number[] = [];
	const plasmaEnergyEv = dice.between(1, 12);
	const dampingEv = dice.logBetween(0.01, 0.3);
	const gap = dice.chance(0.3) ? dice.integer(1, 5) : 0;
	for (let i = 0; i < count; i++) {
		const energy =
			first * (last / first) ** ((i + (i > 0 && i < count - 1 ? dice.between(-0.3, 0.3) : 0)) / (count - 1));
		let value = 0;
		for (const { centre, width, height } of peaks)
			value += height * Math.exp(-((Math.log(energy / centre) / width) ** 2));
		value = (value + 1e-3) * dice.between(0.9, 1.1) * Math.min(1, (last / energy / 6) ** 2);
		if (conducting) value += (plasmaEnergyEv ** 2 * dampingEv) / (energy * (energy ** 2 + dampingEv ** 2));
		energiesEv.push(energy);
		epsilon2.push(!conducting && i < gap ? 0 : value);
	}
	const lowEnd: LowEnd = conducting
		? dice.chance(0.75)
			? { kind: 'drude', plasmaEnergyEv, dampingEv }
			: { kind: 'plasma', plasmaEnergyEv }
		: dice.chance(0.6)
			? { kind: 'power', exponent: dice.pick([1, 1, 2, 0.5, 3]) }
			: { kind: 'none' };
	const highEnd: HighEnd = dice.chance(0.8)
		? { kind: 'power', exponent: dice.pick([3, 3, 2, 2.5, 4]) }
		: { kind: 'none' };
	return { kind: 'table', energiesEv, epsilon2, lowEnd, highEnd };
}

function imaginaryTable(dice: Dice): PermittivityModel {
	const count = dice.integer(12, 40);
	const [first, last] = [dice.logBetween(1e11, 1e14), dice.logBetween(3e16, 1e18)];
	const infrared = dice.between(0.3, 5);
	const ultraviolet = dice.between(0.5, 3);
	const frequenciesRadPerS: number[] = [];
	const epsilon: number[] = [];
	for (let i = 0; i < count; i++) {
		const xi = first * (last / first) ** (i / (count - 1));
		frequenciesRadPerS.push(xi);
		epsilon.push(1 + infrared / (1 + (xi / 2e14) ** 2) + ultraviolet / (1 + (xi / 1.5e16) ** 2));
	}
	return { kind: 'imaginaryTable', frequenciesRadPerS, epsilon };
}

function metal(dice: Dice): MaterialModel {
	const plasmaEnergyEv = dice.logBetween(0.5, 15);
	const drude: PermittivityModel = { kind: 'drude', plasmaEnergyEv, dampingEv: dice.logBetween(0.003, 0.5) };
	const rule = dice.pick(['drude', 'plasma', 'ideal', undefined] as const);
	const permittivity: PermittivityModel = dice.pick([
		() => drude,
		(): PermittivityModel => ({ kind: 'plasma', plasmaEnergyEv }),
		(): PermittivityModel => ({ kind: 'sum', of: [drude, oscillators(dice)] }),
		() => table(dice, true)
	])();
	return rule ? { permittivity, zeroFrequency: rule } : { permittivity };
}

function dielectric(dice: Dice): MaterialModel {
	const permittivity = dice.pick([
		() => insulator(dice),
		() => insulator(dice),
		() => oscillators(dice),
		() => table(dice, false),
		(): PermittivityModel => ({ kind: 'constant', value: dice.logBetween(1.2, 16) })
	])();
	return { permittivity };
}

function magnet(dice: Dice): MaterialModel {
	const value = dice.logBetween(1.1, 1000);
	const base = dice.chance(0.5) ? metal(dice) : dielectric(dice);
	return {
		...base,
		permeability: dice.pick([
			() => ({ kind: 'staticOnly' as const, value }),
			() => ({ kind: 'debye' as const, value, relaxationTimePs: dice.logBetween(0.001, 1000) }),
			() => ({ kind: 'constant' as const, value: dice.between(1, 3) })
		])()
	};
}

function solid(dice: Dice): MaterialModel {
	const roll = dice.between(0, 1);
	if (roll < 0.4) return metal(dice);
	if (roll < 0.82) return dielectric(dice);
	if (roll < 0.9) return magnet(dice);
	if (roll < 0.95) return { permittivity: imaginaryTable(dice) };
	if (roll < 0.98) return { permittivity: { kind: 'idealConductor' } };
	return {
		permittivity: {
			kind: 'sum',
			of: [insulator(dice), { kind: 'dcConductivity', siemensPerM: dice.logBetween(1e-8, 1e4) }]
		}
	};
}

function body(dice: Dice, layers: number): BodyOf<MaterialModel> {
	return {
		layers: Array.from({ length: layers }, () => ({
			of: solid(dice),
			thicknessNm: dice.logBetween(0.3, 2000)
		})),
		substrate: dice.chance(0.05) ? { permittivity: { kind: 'vacuum' } } : solid(dice)
	};
}

/** The material with one oscillator strength moved by a relative contrast of 1e-6 to 1e-2. */
function nearly(dice: Dice, strength: number, frequencyRadPerS: number): PermittivityModel {
	const contrast = dice.logBetween(1e-6, 1e-2) * (dice.chance(0.5) ? 1 : -1);
	return {
		kind: 'ninhamParsegian',
		terms: [
			{ strength: 1.3, frequencyRadPerS: 2e14 },
			{ strength: strength * (1 + contrast), frequencyRadPerS }
		]
	};
}

function nearMatched(dice: Dice): Pick<ArrangementOf<MaterialModel>, 'left' | 'medium' | 'right'> {
	if (dice.chance(0.3)) {
		const value = dice.between(1.5, 10);
		const near = () => ({
			permittivity: { kind: 'constant' as const, value: value * (1 + dice.logBetween(1e-6, 1e-2)) }
		});
		return {
			left: { layers: [], substrate: near() },
			medium: { permittivity: { kind: 'constant', value } },
			right: { layers: [], substrate: near() }
		};
	}
	const strength = dice.between(0.7, 2);
	const frequency = dice.logBetween(8e15, 2.5e16);
	const near = () => ({ permittivity: nearly(dice, strength, frequency) });
	return {
		left: {
			layers: dice.chance(0.3) ? [{ of: near(), thicknessNm: dice.logBetween(1, 100) }] : [],
			substrate: near()
		},
		medium: {
			permittivity: {
				kind: 'ninhamParsegian',
				terms: [
					{ strength: 1.3, frequencyRadPerS: 2e14 },
					{ strength, frequencyRadPerS: frequency }
				]
			}
		},
		right: { layers: [], substrate: dice.chance(0.5) ? near() : solid(dice) }
	};
}

/** Three insulators in ascending order at most frequencies: repulsion, or a change of sign where the order turns. */
function ordered(dice: Dice): Pick<ArrangementOf<MaterialModel>, 'left' | 'medium' | 'right'> {
	const frequency = dice.logBetween(8e15, 2e16);
	const step = (infrared: number, ultraviolet: number): MaterialModel => ({
		permittivity: {
			kind: 'ninhamParsegian',
			terms: [
				{ strength: infrared, frequencyRadPerS: dice.logBetween(1e14, 5e14) },
				{ strength: ultraviolet, frequencyRadPerS: frequency * dice.between(0.7, 1.3) }
			]
		}
	});
	return {
		left: { layers: [], substrate: step(dice.between(0.1, 1), dice.between(0.8, 1.1)) },
		medium: step(dice.between(0.1, 4), dice.between(1.1, 1.5)),
		right: {
			layers: [],
			substrate: dice.chance(0.5) ? metal(dice) : step(dice.between(1, 6), dice.between(1.5, 3))
		}
	};
}

/** Two bodies, sometimes alike, sometimes with a layer of the medium's or the substrate's own material. */
function pair(
	dice: Dice,
	medium: MaterialModel
): Pick<ArrangementOf<MaterialModel>, 'left' | 'medium' | 'right'> {
	const count = () => dice.pick([0, 0, 0, 1, 1, 2, 3]);
	const left = body(dice, count());
	if (dice.chance(0.05)) left.layers.push({ of: left.substrate, thicknessNm: dice.logBetween(1, 100) });
	if (dice.chance(0.05)) left.layers.unshift({ of: medium, thicknessNm: dice.logBetween(1, 100) });
	return { left, medium, right: dice.chance(0.2) ? structuredClone(left) : body(dice, count()) };
}

function temperature(dice: Dice): number {
	const roll = dice.between(0, 1);
	if (roll < 0.15) return 0;
	if (roll < 0.25) return dice.logBetween(0.5, 10);
	if (roll < 0.6) return dice.pick([293.15, 298.15, 300]);
	return dice.between(10, 1000);
}

/** The same request for the same seed; every fourth one holds a fitted band, a mixture or a law of temperature somewhere, another fourth a uniaxial place or a sheet. */
export function randomRequest(seed: number): ForceRequest {
	const request = plainRequest(seed);
	if (seed % 4 === 0) return withComposed(request, seed);
	return seed % 4 === 2 ? withDress(request, seed) : request;
}

/** Another stream of numbers, so that what is drawn here changes nothing that was drawn before. */
function withComposed(request: ForceRequest, seed: number): ForceRequest {
	const random = seededRandom(seed ^ 0x5bd1e995);
	const { arrangement } = request;
	const { left, medium } = arrangement;
	if (random() < 0.3 && medium.permittivity.kind !== 'constant' && arrangement.debyeLengthNm === undefined)
		return { ...request, arrangement: { ...arrangement, medium: { permittivity: composedLiquid(random) } } };
	const fresh: MaterialModel = { permittivity: composedSolid(random) };
	const body =
		left.layers.length > 0 && random() < 0.5
			? { ...left, layers: [{ ...left.layers[0], of: fresh }, ...left.layers.slice(1)] }
			: { ...left, substrate: fresh };
	return { ...request, arrangement: { ...arrangement, left: body } };
}

/** An axis and a sheet at the face of each body, or behind its first layer. */
function withDress(request: ForceRequest, seed: number): ForceRequest {
	const random = seededRandom(seed ^ 0x2545f491);
	const body = (given: BodyOf<MaterialModel>): BodyOf<MaterialModel> => {
		const dress = (material: MaterialModel): MaterialModel =>
			material.permittivity.kind === 'idealConductor' ? material : dressed(random, material);
		if (given.layers.length === 0 || random() < 0.4) return { ...given, substrate: dress(given.substrate) };
		const [first, ...rest] = given.layers;
		return { ...given, layers: [{ ...first, of: dress(first.of) }, ...rest] };
	};
	const { left, right } = request.arrangement;
	const both = random() < 0.5;
	return {
		...request,
		arrangement: { ...request.arrangement, left: body(left), right: both ? body(right) : right }
	};
}

/** A valid request drawn over everything plates are computed for; the same for the same seed. */
function plainRequest(seed: number): ForceRequest {
	const dice = new Dice(seededRandom(seed));
	const temperatureK = temperature(dice);
	const across: MaterialModel = {
		permittivity: dice.chance(0.5) ? { kind: 'vacuum' } : liquid(dice)
	};
	const roll = dice.between(0, 1);
	const chosen = roll < 0.12 ? nearMatched(dice) : roll < 0.22 ? ordered(dice) : pair(dice, across);
	const ionic = temperatureK > 0 && chosen.medium.permittivity.kind !== 'vacuum' && dice.chance(0.25);
	return {
		arrangement: {
			...chosen,
			shape: { kind: 'plates' },
			temperatureK,
			...(ionic ? { debyeLengthNm: dice.logBetween(0.5, 300) } : {})
		},
		separationsNm: Array.from({ length: dice.integer(1, 2) }, () => dice.logBetween(0.5, 50_000)).sort(
			(a, b) => a - b
		),
		relativeAccuracy: 10 ** -dice.between(4, 10),
		include: []
	};
}
