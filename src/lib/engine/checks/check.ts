import type { PermittivityModel } from '../contract.ts';

/** What a check is given: the model, the rows behind it where it came from a table, and what is known of the material. */
export interface CheckSubject {
	model: PermittivityModel;
	/** Over photon energies in eV, ascending where they are in order. */
	rows: { energiesEv: number[]; epsilon1: number[] | null; epsilon2: number[] } | null;
	material: {
		class: 'metal' | 'semiconductor' | 'insulator' | 'polymer' | 'liquid' | 'gas';
		formula: string | null;
		densityGPerCm3: number | null;
		/** Known from elsewhere; null for conductors and where nobody has stated it. */
		staticPermittivity: number | null;
	};
	/** Other published versions of the material, by name; absent where nothing is to be held against them. */
	others?: { ref: string; model: PermittivityModel }[];
}

/** `fail` blocks submission, `warn` must be answered with a reason, `info` stands as it is. */
export interface CheckOutcome {
	code: string;
	severity: 'fail' | 'warn' | 'info';
	/** A sentence that carries its figure. */
	message: string;
	figure: number | null;
	threshold: number | null;
}

/** Null where the check does not apply to the subject. */
export type Check = (subject: CheckSubject) => CheckOutcome | null;

/** Four significant digits at most, without a tail of zeros: the figure of a sentence. */
export function asText(value: number): string {
	const size = Math.abs(value);
	if (size !== 0 && (size >= 1e6 || size < 1e-3)) return value.toExponential(2).replace('e+', 'e');
	return String(Number(value.toPrecision(4)));
}

export const percent = (share: number): string => `${asText(share * 100)} %`;
