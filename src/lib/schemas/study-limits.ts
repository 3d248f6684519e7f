/** Limits of a study, apart from the schemas so that the page need not carry those. */

export const CHOICES_MAX = 5;
export const CHOICE_NAME_MAX = 60;
export const MARKS_MAX = 6;
export const MARK_LABEL_MAX = 24;
/** Widest axis: what the engine accepts. */
export const SEPARATION_RANGE_NM = { min: 0.1, max: 1e6 } as const;
export const THICKNESS_RANGE_NM = { min: 0.1, max: 1e6 } as const;
export const TEMPERATURE_RANGE_K = { min: 0.5, max: 5000 } as const;
export const QUANTITIES = ['pressure', 'energy', 'gradient', 'force'] as const;
