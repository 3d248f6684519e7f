import type { PermittivityModel } from '../contract.ts';
import { susceptibility } from '../permittivity/evaluator.ts';
import { conducts } from '../permittivity/susceptibility.ts';

/** eps(0) of a model, or null where it grows without limit: the model conducts. */
export function staticPermittivity(model: PermittivityModel): number | null {
	if (model.kind === 'idealConductor') return null;
	const { atZero } = susceptibility(model);
	return conducts(atZero) ? null : 1 + atZero.finite;
}
