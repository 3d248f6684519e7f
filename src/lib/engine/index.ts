/** The door of the engine: what services, checks and previews use. */
export { ENGINE_VERSION } from './version.ts';
export { CONSTANTS_RELEASE } from './constants.ts';
export { ENGINE_LIMITS } from './limits.ts';
export { Refusal, type Issue } from './refusal.ts';
export { evaluate, prepare, type Preparation } from './prepare.ts';
export {
	screeningKernel,
	type ScreeningKernel,
	type ScreeningPressure,
	type ScreeningTriple
} from './screening.ts';
export { estimateCost, type Cost } from './cost.ts';
export { separationsOf } from './validate.ts';
export { debyeLength } from './ions.ts';
export { closestSeparationNm } from './shapes/roughness.ts';
export { matsubaraFrequency } from './lifshitz/matsubara.ts';
export { permittivityOnImaginaryAxis, permittivityOnRealAxis } from './permittivity/evaluator.ts';
export { permittivityIssues } from './validate-permittivity.ts';
export { epsilonShares, epsilonSharesOf, type EpsilonShares, type TableModel } from './permittivity/table.ts';
export {
	evFromRadPerS,
	radPerSFromEv,
	radPerSFromHz,
	radPerSFromPerCm,
	radPerSFromWavelength,
	RAD_PER_S_PER_EV
} from './units.ts';
export type * from './contract.ts';
