/**
 * What the engine accepts. Beyond these a request is refused with the limit named; inside, the bound stays meaningful.
 * `schemas` and forms read the same numbers.
 */
export const ENGINE_LIMITS = {
	separationNm: { min: 0.1, max: 1e6 },
	/** Below this a sharp interface and a local permittivity stop being meaningful: computed, with a warning. */
	continuumNm: 1,
	separations: 2000,
	layers: 40,
	thicknessNm: { min: 0.1, max: 1e6 },
	/** Zero is allowed too: the integral over frequency. */
	temperatureK: { min: 0.5, max: 5000 },
	relativeAccuracy: { min: 1e-11, max: 1e-3 },
	radiusUm: { min: 1e-3, max: 1e7 },
	debyeLengthNm: { min: 0.05, max: 1e6 },
	molPerL: { min: 1e-12, max: 20 },
	valence: { min: 1, max: 4 },
	roughnessRmsNm: { min: 0, max: 1e5 },
	heightBins: 200,
	/** Sensitivities are for a few separations: each answers some ten thousand numbers. */
	sensitivitySeparations: 20,
	uncertaintySeparations: 200,
	rivals: 20,
	uncertainParameters: 60,
	relativeUncertainty: { min: 0, max: 10 },
	tableRows: 20_000,
	terms: 200,
	nesting: 4,
	constant: { min: 1, max: 1e6 },
	plasmaEnergyEv: { min: 1e-6, max: 1e4 },
	dampingEv: { min: 0, max: 1e4 },
	energyEv: { min: 0, max: 1e7 },
	strengthEv2: { min: 0, max: 1e10 },
	strength: { min: 0, max: 1e6 },
	relaxationTimePs: { min: 1e-6, max: 1e12 },
	frequencyRadPerS: { min: 1e3, max: 1e22 },
	/** A gap of zero would leave nothing to begin the absorption at. */
	gapEv: { min: 1e-3, max: 1e4 },
	/** Of what must not vanish: resonances, widths and broadenings of fitted bands. */
	bandEv: { min: 1e-6, max: 1e6 },
	amplitudeEv: { min: 0, max: 1e8 },
	wavelengthUm: { min: 1e-4, max: 1e5 },
	sellmeierConstant: { min: -1, max: 1e3 },
	activationK: { min: -1e5, max: 1e5 },
	debyeK: { min: 1, max: 1e4 },
	/** Of a sheet; graphene has 6e-5 S. */
	sheetSiemens: { min: 1e-12, max: 1e3 },
	siemensPerM: { min: 1e-15, max: 1e10 },
	epsilon2: { min: 0, max: 1e12 },
	lowExponent: { min: 0.05, max: 10 },
	highExponent: { min: 0.5, max: 12 },
	permeability: { min: 1e-3, max: 1e6 }
} as const;
