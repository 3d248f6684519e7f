/**
 * What the engine is asked and what it answers, as plain types. Units stand in the field names because these objects
 * cross the door of the engine (evaluate.ts converts once to SI). The zod schemas of lib/schemas describe the same
 * shapes for callers outside; a compile-time test there holds the two equal.
 */

/** eps''(omega) below the first point of a table. */
export type LowEnd =
	| { kind: 'drude'; plasmaEnergyEv: number; dampingEv: number }
	| { kind: 'plasma'; plasmaEnergyEv: number }
	| { kind: 'power'; exponent: number }
	| { kind: 'none' };

/** eps''(omega) above the last point of a table. */
export type HighEnd = { kind: 'power'; exponent: number } | { kind: 'none' };

export interface LorentzTerm {
	strengthEv2: number;
	energyEv: number;
	dampingEv: number;
}

export interface DebyeTerm {
	strength: number;
	relaxationTimePs: number;
}

export interface NinhamParsegianTerm {
	strength: number;
	frequencyRadPerS: number;
}

/** Relative permittivity on the imaginary axis; energies mean hbar*omega. */
export type PermittivityModel =
	| { kind: 'vacuum' }
	| { kind: 'constant'; value: number }
	| { kind: 'idealConductor' }
	| { kind: 'drude'; plasmaEnergyEv: number; dampingEv: number }
	| { kind: 'plasma'; plasmaEnergyEv: number }
	| { kind: 'lorentz'; terms: LorentzTerm[] }
	| { kind: 'debye'; terms: DebyeTerm[] }
	| { kind: 'ninhamParsegian'; terms: NinhamParsegianTerm[] }
	| { kind: 'dcConductivity'; siemensPerM: number }
	| { kind: 'table'; energiesEv: number[]; epsilon2: number[]; lowEnd: LowEnd; highEnd: HighEnd }
	| { kind: 'imaginaryTable'; frequenciesRadPerS: number[]; epsilon: number[] }
	| { kind: 'sum'; of: PermittivityModel[] };

export type PermittivityKind = PermittivityModel['kind'];

/** Relative permeability; 1 where absent. */
export type PermeabilityModel =
	| { kind: 'constant'; value: number }
	| { kind: 'staticOnly'; value: number }
	| { kind: 'debye'; value: number; relaxationTimePs: number };

/** How the n = 0 term of a conductor is taken; touches no other term. */
export type ZeroFrequencyRule = 'drude' | 'plasma' | 'ideal';

export interface MaterialModel {
	permittivity: PermittivityModel;
	permeability?: PermeabilityModel;
	zeroFrequency?: ZeroFrequencyRule;
}

/** Layers run from the gap outwards; the substrate fills the rest. `M` is how a material is named. */
export interface BodyOf<M> {
	layers: { of: M; thicknessNm: number }[];
	substrate: M;
}

export type Shape =
	| { kind: 'plates' }
	| { kind: 'spherePlate'; radiusUm: number }
	| { kind: 'spheres'; leftRadiusUm: number; rightRadiusUm: number }
	| { kind: 'crossedCylinders'; leftRadiusUm: number; rightRadiusUm: number }
	| { kind: 'cylinderPlate'; radiusUm: number }
	| { kind: 'parallelCylinders'; leftRadiusUm: number; rightRadiusUm: number };

export interface ArrangementOf<M> {
	left: BodyOf<M>;
	medium: M;
	right: BodyOf<M>;
	shape: Shape;
	temperatureK: number;
	debyeLengthNm?: number;
}

export type Separations = number[] | { from: number; to: number; count: number; spacing: 'log' | 'linear' };

export type Extra = 'breakdown';

export interface ForceRequestOf<M> {
	arrangement: ArrangementOf<M>;
	separationsNm: Separations;
	relativeAccuracy: number;
	include: Extra[];
}

/** What the engine computes: every material given in place. */
export type ForceRequest = ForceRequestOf<MaterialModel>;

/** The parts add up to the total; te and tm are all terms n >= 1 (or, at T = 0, the whole integral). */
export interface Parts {
	zeroTe: number;
	zeroTm: number;
	te: number;
	tm: number;
}

export interface Breakdown {
	freeEnergyJPerM2: Parts;
	pressurePa: Parts;
	pressureGradientPaPerM: Parts;
}

/** Negative energy, pressure and force attract. */
export interface ForcePoint {
	separationNm: number;
	freeEnergyJPerM2: number;
	pressurePa: number;
	pressureGradientPaPerM: number;
	/** N; N/m for the two shapes that are per unit length; absent for plates. */
	forceN?: number;
	/** N/m; N/m^2 for the two shapes that are per unit length; absent for plates. */
	forceGradientNPerM?: number;
	/** Relative to the magnitude of the value beside it; the true error is never larger. */
	errorBound: { freeEnergy: number; pressure: number; pressureGradient: number };
	/** Relative estimate of the proximity approximation's own error; shapes only. */
	shapeError?: number;
	/** False where the accuracy asked for was not reached; `why` says so. */
	met: boolean;
	why?: string;
	breakdown?: Breakdown;
}

export interface Equilibrium {
	separationNm: number;
	stable: boolean;
	/** dP/dd, Pa/m: negative where stable. */
	stiffnessPaPerM: number;
}

export interface Warning {
	code: string;
	text: string;
}

export interface ForceAnswer {
	engine: string;
	points: ForcePoint[];
	equilibria: Equilibrium[];
	warnings: Warning[];
}
