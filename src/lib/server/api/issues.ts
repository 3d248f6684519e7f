import type { z } from 'zod';
import { InvalidInput, type Issue } from '../errors.ts';

/** From what zod found wrong to what a person can act on: the field by its path, and one sentence each. */

/** More would not be read, and a hostile body could ask for a million. */
const ISSUES_MAX = 100;

type ZodIssue = z.core.$ZodIssue;

/** `['arrangement', 'left', 'layers', 0, 'thicknessNm']` as `arrangement.left.layers[0].thicknessNm`. */
export function fieldPath(path: readonly PropertyKey[]): string {
	return path
		.map((key, index) =>
			typeof key === 'number' ? `[${key}]` : index === 0 ? String(key) : `.${String(key)}`
		)
		.join('');
}

/**
 * Of the alternatives of a union, the one that was meant: whose problems lie inside the value and not at the value as a
 * whole. Where none stands out, the union is reported as one.
 */
function flatten(issue: ZodIssue, base: readonly PropertyKey[] = []): Issue[] {
	const path = [...base, ...issue.path];
	if (issue.code === 'invalid_union') {
		const meant = issue.errors.filter(
			(branch) => branch.length > 0 && branch.every(({ path }) => path.length > 0)
		);
		if (meant.length === 1) return meant[0].flatMap((inner) => flatten(inner, path));
	}
	if (issue.code === 'unrecognized_keys') {
		return issue.keys.map((key) => ({
			path: fieldPath([...path, key]),
			message: 'is not a field here; check the spelling or leave it out'
		}));
	}
	return [{ path: fieldPath(path), message: issue.message }];
}

export function issuesOf(error: z.ZodError): Issue[] {
	return error.issues
		.slice(0, ISSUES_MAX)
		.flatMap((issue) => flatten(issue))
		.slice(0, ISSUES_MAX);
}

/** @throws InvalidInput naming each field that is wrong */
export function parseInput<T>(
	schema: z.ZodType<T>,
	value: unknown,
	message = 'The request is not valid.'
): T {
	const parsed = schema.safeParse(value);
	if (parsed.success) return parsed.data;
	throw new InvalidInput(message, issuesOf(parsed.error));
}
