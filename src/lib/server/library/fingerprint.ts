import type { PermittivityModel } from '../../engine/contract.ts';
import { canonicalJson, sha256 } from './canonical.ts';

/** Digits that survive a change of unit and of notation in a file. */
const DIGITS = 9;

const rounded = (value: unknown): unknown => {
	if (typeof value === 'number') return value.toExponential(DIGITS - 1);
	if (Array.isArray(value)) return value.map(rounded);
	if (typeof value === 'object' && value !== null)
		return Object.fromEntries(Object.entries(value).map(([key, field]) => [key, rounded(field)]));
	return value;
};

/**
 * Of the values alone: the same table in nm and in eV, or with another number of trailing zeros, has the same one. The
 * ends of a table are a choice and not data, so they do not enter.
 */
export function fingerprint(model: PermittivityModel, epsilon1: number[] | null): string {
	const values =
		model.kind === 'table' ? { energiesEv: model.energiesEv, epsilon1, epsilon2: model.epsilon2 } : model;
	return sha256(canonicalJson(rounded(values)));
}
