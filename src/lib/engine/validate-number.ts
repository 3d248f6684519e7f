import type { Issue } from './refusal.ts';

/** Adds an issue unless value is a finite number inside the range, ends included. */
export function checkRange(
	issues: Issue[],
	path: string,
	value: unknown,
	{ min, max }: { min: number; max: number },
	unit = ''
): boolean {
	const suffix = unit === '' ? '' : ` ${unit}`;
	if (typeof value !== 'number' || !Number.isFinite(value)) {
		issues.push({ path, message: `must be a finite number between ${min} and ${max}${suffix}` });
		return false;
	}
	if (value >= min && value <= max) return true;
	issues.push({ path, message: `is ${value}${suffix}; the engine takes ${min} to ${max}${suffix}` });
	return false;
}
