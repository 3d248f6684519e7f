import type { PermittivityModel } from '../contract.ts';

/** A step of a parameter small enough for its fourth order to vanish and large enough for rounding not to show. */
const STEP = 2e-3;

type Node = Record<string, unknown>;

const keysOf = (name: string): string[] => name.split(/[.[\]]+/).filter((key) => key !== '');

/** The number that a path names in a model, as `terms[0].dampingEv`; undefined where there is none. */
export function parameterAt(model: PermittivityModel, name: string): number | undefined {
	let found: unknown = model;
	for (const key of keysOf(name)) {
		if (typeof found !== 'object' || found === null || !Object.hasOwn(found, key)) return undefined;
		found = (found as Node)[key];
	}
	return typeof found === 'number' ? found : undefined;
}

/** The model with another number at a path that `parameterAt` knows. */
export function withParameter(model: PermittivityModel, name: string, value: number): PermittivityModel {
	const keys = keysOf(name);
	const copy = structuredClone(model);
	let holder = copy as unknown as Node;
	for (const key of keys.slice(0, -1)) holder = holder[key] as Node;
	holder[keys[keys.length - 1]] = value;
	return copy;
}

/**
 * d value/d parameter of anything that follows from a model, by central differences of two widths, the error of second order
 * taken out. Closed forms are smooth in their parameters, so some ten digits are right; one-sided at a parameter that is zero.
 */
export function byParameter(
	model: PermittivityModel,
	name: string,
	of: (model: PermittivityModel) => number[]
): number[] {
	const at = parameterAt(model, name) ?? 0;
	const value = (step: number): number[] => of(withParameter(model, name, at + step));
	if (at === 0) {
		const [here, near, far] = [value(0), value(1e-9), value(2e-9)];
		return here.map((one, i) => (4 * near[i] - far[i] - 3 * one) / 2e-9);
	}
	const difference = (h: number): number[] => {
		const [above, below] = [value(h), value(-h)];
		return above.map((one, i) => (one - below[i]) / (2 * h));
	};
	const [wide, narrow] = [difference(STEP * at), difference((STEP * at) / 2)];
	return narrow.map((one, i) => (4 * one - wide[i]) / 3);
}
