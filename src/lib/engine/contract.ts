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

/** A Lorentz oscillator whose resonance is spread by a normal distribution of standard deviation `widthEv`. */
export interface BrendelBormannTerm {
	strengthEv2: number;
	energyEv: number;
	dampingEv: number;
	widthEv: number;
}

export interface TaucLorentzTerm {
	amplitudeEv: number;
	energyEv: number;
	broadeningEv: number;
	gapEv: number;
}

/** `transitionEv`: how far above the gap the Lorentz shape takes over. */
export interface CodyLorentzTerm extends TaucLorentzTerm {
	transitionEv: number;
}

/** n^2 = 1 + constant + sum strength lambda^2/(lambda^2 - wavelength^2), fitted over a transparent band. */
export interface SellmeierModel {
	kind: 'sellmeier';
	terms: { strength: number; wavelengthUm: number }[];
	constant: number;
	/** Where the Cauchy plot of the ultraviolet pair is drawn; poles beyond `to` are infrared and kept. */
	bandUm: { from: number; to: number };
}

/** How a parameter follows the temperature, in its own unit. */
export type TemperatureLaw =
	| { kind: 'polynomial'; coefficients: number[]; scale: 'kelvin' | 'celsius' }
	| { kind: 'arrhenius'; value: number; referenceK: number; activationK: number }
	| { kind: 'blochGruneisen'; value: number; referenceK: number; debyeK: number; residualShare: number };

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
	| { kind: 'brendelBormann'; terms: BrendelBormannTerm[] }
	| { kind: 'taucLorentz'; terms: TaucLorentzTerm[] }
	| { kind: 'codyLorentz'; terms: CodyLorentzTerm[] }
	| SellmeierModel
	| { kind: 'sum'; of: PermittivityModel[] }
	| { kind: 'maxwellGarnett'; host: PermittivityModel; inclusion: PermittivityModel; fraction: number }
	| { kind: 'bruggeman'; host: PermittivityModel; inclusion: PermittivityModel; fraction: number }
	/** `of` as it stands belongs to no special temperature; in an arrangement each law sets the parameter that it names. */
	| {
			kind: 'temperatureDependent';
			of: PermittivityModel;
			rangeK: { from: number; to: number };
			laws: { parameter: string; law: TemperatureLaw }[];
	  };

export type PermittivityKind = PermittivityModel['kind'];

/** Relative permeability; 1 where absent. */
export type PermeabilityModel =
	| { kind: 'constant'; value: number }
	| { kind: 'staticOnly'; value: number }
	| { kind: 'debye'; value: number; relaxationTimePs: number };

/**
 * How the n = 0 term of a material is taken; touches no other term. `dcCounted` lets a dielectric conduct at zero
 * frequency, `dcIgnored` leaves out the dc conductivity that a model states.
 */
export type ZeroFrequencyRule = 'drude' | 'plasma' | 'ideal' | 'dcCounted' | 'dcIgnored';

/**
 * Standard uncertainty of a permittivity. `scale`: of eps - 1 at all frequencies in common; `table`: relative, of eps'' at
 * energies of a table, straight in ln(energy) between them, in common (a calibration) or each point for itself (noise);
 * `parameters`: covariance of numbers of the model, named by their path in it, as `plasmaEnergyEv` or `terms[0].strength`.
 */
export type Uncertainty =
	| { kind: 'scale'; relative: number }
	| { kind: 'table'; energiesEv: number[]; relative: number[]; correlation: 'common' | 'independent' }
	| { kind: 'parameters'; names: string[]; covariance: number[][] };

/** A layer of no thickness that conducts in its plane; `drude`: sigma/(1 + xi/gamma). */
export type SheetModel =
	{ kind: 'constant'; siemens: number } | { kind: 'drude'; siemens: number; dampingEv: number };

/** What lies along the normal of a uniaxial body. */
export interface NormalModel {
	permittivity: PermittivityModel;
}

export interface MaterialModel {
	/** Of a uniaxial body that in the plane of its face. */
	permittivity: PermittivityModel;
	/** Permittivity along the normal: the optic axis of a uniaxial body. Bodies and layers only. */
	normal?: NormalModel;
	/** On the face towards the gap. Bodies and layers only. */
	sheet?: SheetModel;
	permeability?: PermeabilityModel;
	zeroFrequency?: ZeroFrequencyRule;
	uncertainty?: Uncertainty;
}

/** Another material at some places, for the spread of results over rival data. */
export interface RivalOf<M> {
	/** Paths in the arrangement: `left.substrate`, `left.layers[0].of`, `medium`. */
	places: string[];
	of: M;
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

/** A z:z electrolyte in the medium; without `staticPermittivity` that of the medium's own model counts. */
export interface Salt {
	molPerL: number;
	valence: number;
	staticPermittivity?: number;
}

/** What mobile ions of the medium do to the n = 0 TM term: nothing, screen it, or take it away altogether. */
export type IonTreatment = 'full' | 'screened' | 'off';

/** Heights of one surface about its mean plane, positive into the gap. */
export type Heights =
	{ kind: 'rms'; rmsNm: number } | { kind: 'histogram'; heightsNm: number[]; weights: number[] };

export interface Roughness {
	left?: Heights;
	right?: Heights;
}

export interface ArrangementOf<M> {
	left: BodyOf<M>;
	medium: M;
	right: BodyOf<M>;
	shape: Shape;
	temperatureK: number;
	debyeLengthNm?: number;
	/** Instead of `debyeLengthNm`. */
	salt?: Salt;
	/** Where it is left out: `screened` with a Debye length or a salt, else `full`. */
	ions?: IonTreatment;
	roughness?: Roughness;
}

export type Separations = number[] | { from: number; to: number; count: number; spacing: 'log' | 'linear' };

export type Extra = 'breakdown' | 'analysis' | 'terms' | 'sensitivity' | 'uncertainty';

export interface ForceRequestOf<M> {
	arrangement: ArrangementOf<M>;
	separationsNm: Separations;
	relativeAccuracy: number;
	include: Extra[];
	rivals?: RivalOf<M>[];
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
	analysis?: PointAnalysis;
	terms?: Terms;
	sensitivity?: Sensitivity;
	uncertainty?: PointUncertainty;
	spread?: Spread;
}

/** A figure with a bound on its own error, relative to its magnitude. */
export interface BoundedFigure {
	value: number;
	errorBound: number;
}

/** What is read off free energy, pressure and gradient of the plates at one separation; nothing is fitted. */
export interface PointAnalysis {
	/** Effective Hamaker coefficients in J: -12 pi d^2 F and -6 pi d^3 P; they part where retardation sets in. */
	hamakerFromFreeEnergyJ: BoundedFigure;
	hamakerFromPressureJ: BoundedFigure;
	/** d ln|F|/d ln d = -d P/F and d ln|P|/d ln d = d G/P; absent where the divisor is not known from zero. */
	freeEnergyExponent?: BoundedFigure;
	pressureExponent?: BoundedFigure;
	/** To two ideal conductors across vacuum at T = 0. */
	ratioToIdeal: { freeEnergy: BoundedFigure; pressure: BoundedFigure; pressureGradient: BoundedFigure };
	/** To the same bodies with smooth surfaces; only where roughness is stated. */
	roughnessFactor?: { freeEnergy: BoundedFigure; pressure: BoundedFigure; pressureGradient: BoundedFigure };
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

/** Terms n = 0..29 of a sum, n = 0 with its half weight, and all the others; `errorBound` is absolute, for each of them. */
export interface TermSeries {
	first: number[];
	rest: number;
	errorBound: number;
}

/** Of the plates with smooth surfaces; the thermal shares are (value - value at T = 0)/value, the models held fixed. */
export interface Terms {
	/** Absent at T = 0, where there is an integral and no terms. */
	freeEnergyJPerM2?: TermSeries;
	pressurePa?: TermSeries;
	thermalShare: { freeEnergy?: BoundedFigure; pressure?: BoundedFigure };
}

/** Free energy in J/m^2 and pressure in Pa, or what they change by. */
export interface EnergyAndPressure {
	freeEnergyJPerM2: number;
	pressurePa: number;
}

/** Relative change of a result per relative change of what it depends on. */
export interface Elasticity {
	freeEnergy?: BoundedFigure;
	pressure?: BoundedFigure;
}

/**
 * How much the result depends on eps'' at real frequencies: delta P = int kernel delta eps'' d(hbar omega). `weight` is the
 * relative change of the result per unit of ln(hbar omega) where eps'' there changes by its own size; null where the model
 * says nothing about the real axis.
 */
export interface Kernel {
	energiesEv: number[];
	freeEnergyJPerM2PerEv: number[];
	pressurePaPerEv: number[];
	freeEnergyWeight: (number | null)[];
	pressureWeight: (number | null)[];
	/** Absolute, the same for every energy, relative to the largest magnitude of each row. */
	errorBound: number;
}

export interface PlaceSensitivity {
	/**
	 * Path in the arrangement: `left.substrate`, `left.layers[0].of`, `medium`. A uniaxial place has its permittivity in the
	 * plane there and, apart, that along its normal as `left.substrate.normal`.
	 */
	place: string;
	/** Derivatives to eps(i xi) of one term n, at the frequencies of the answer (at T = 0 per rad/s of xi). */
	freeEnergyJPerM2: number[];
	pressurePa: number[];
	/** To eps(0), half weight included; absent where the static term does not depend on it. */
	static?: EnergyAndPressure;
	/** What integration over wave number leaves open, relative to the largest derivative of all places and frequencies. */
	errorBound: number;
	/** Of eps - 1 as a whole; a plasma frequency that counts at n = 0 in TE moves with it. */
	elasticity: Elasticity;
	/** Of the conductivity of a sheet on the place. */
	sheet?: Elasticity;
	kernel: Kernel;
	/** Tables: elasticity of what lies below, inside and above the measured points. */
	reliance?: { below: Elasticity; inside: Elasticity; above: Elasticity };
}

/** Of the plates with smooth surfaces. */
export interface Sensitivity {
	/** Sums over all n >= 1 are sums of weight times the value at these frequencies. */
	xiRadPerS: number[];
	weight: number[];
	places: PlaceSensitivity[];
}

/** What stated uncertainties of the data do to the result, to first order: standard uncertainties, absolute. */
export interface PointUncertainty {
	freeEnergyJPerM2: BoundedFigure;
	pressurePa: BoundedFigure;
	/** Departure of displaced results from the first order, as a share of it; at 0.2 and more the answer warns. */
	beyondFirstOrder?: { freeEnergy: number; pressure: number };
	/** One entry a material with a stated uncertainty; independent of each other, so their squares add up. */
	contributions: Contribution[];
}

export interface Contribution extends EnergyAndPressure {
	places: string[];
}

/** Lowest and highest result over the arrangement and its rivals; `errorBound` is the largest relative bound among them. */
export interface Spread {
	freeEnergyJPerM2: Extent;
	pressurePa: Extent;
	/** One entry a rival. */
	rivals: EnergyAndPressure[];
}

export interface Extent {
	low: number;
	high: number;
	errorBound: number;
}

/** The Hamaker coefficient that the arrangement tends to at short separations, or why there is none. */
export interface NonRetardedLimit {
	hamakerJ?: BoundedFigure;
	why?: string;
}

/** What belongs to the arrangement and to no single separation; present where it was asked for. */
export interface WholeAnalysis {
	nonRetarded?: NonRetardedLimit;
}

export interface ForceAnswer extends WholeAnalysis {
	engine: string;
	points: ForcePoint[];
	equilibria: Equilibrium[];
	warnings: Warning[];
}
