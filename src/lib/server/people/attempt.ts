import { z } from 'zod';
import { knownProblem } from '../api/problem.ts';
import { issuesOf } from '../api/issues.ts';
import { InvalidInput, type Issue } from '../errors.ts';

/** Calls a service for a form, and keeps what it refuses as something to show beside the fields. */

export interface Refused {
	message: string;
	issues: Issue[];
}

export type Attempt<T> =
	| { failed: false; value: T }
	| { failed: true; status: number; refused: Refused; headers: Record<string, string> };

/** Anything unforeseen goes on to the hook that logs it. */
export async function attempt<T>(work: () => Promise<T>): Promise<Attempt<T>> {
	try {
		return { failed: false, value: await work() };
	} catch (error) {
		const known = knownProblem(error);
		if (!known) throw error;
		const { message, issues = [] } = known.error;
		return { failed: true, status: known.status, refused: { message, issues }, headers: known.headers ?? {} };
	}
}

/** @throws InvalidInput with a sentence for each field that is wrong */
export function parseForm<T>(shape: z.ZodType<T>, values: unknown): T {
	const parsed = shape.safeParse(values);
	if (parsed.success) return parsed.data;
	throw new InvalidInput('Look at the marked fields again.', issuesOf(parsed.error));
}

/** The text of a field; a file or nothing counts as empty. */
export function field(form: FormData, name: string): string {
	const value = form.get(name);
	return typeof value === 'string' ? value : '';
}
