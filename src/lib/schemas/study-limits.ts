/** Limits of a study, apart from the schemas so that the page need not carry those. */

export const CHOICES_MAX = 5;
export const CHOICE_NAME_MAX = 60;
export const MARKS_MAX = 6;
export const MARK_LABEL_MAX = 24;
/** Widest axis: what the engine accepts. */
export const SEPARATION_RANGE_NM = { min: 0.1, max: 1e6 } as const;
export const THICKNESS_RANGE_NM = { min: 0.1, max: 1e6 } as const;
export const TEMPERATURE_RANGE_K = { min: 0.5, max: 5000 } as const;
export const SALT_RANGE_MOL_PER_L = { min: 1e-9, max: 10 } as const;
export const VALENCES = [1, 2, 3] as const;
export const ROUGHNESS_RANGE_NM = { min: 0.01, max: 1e4 } as const;
/** Of a conducting sheet: graphene has 6.09e-5 S. */
export const SHEET_RANGE_SIEMENS = { min: 1e-12, max: 1e3 } as const;
/** A relative standard uncertainty of eps - 1, the same for every material. */
export const UNCERTAINTY_RANGE = { min: 1e-4, max: 1 } as const;
export const QUANTITIES = ['pressure', 'energy', 'gradient', 'force'] as const;
