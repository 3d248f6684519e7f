import { createHash } from 'node:crypto';

/** JSON with keys in code-point order and no blanks: equal values, equal text. `undefined` fields are left out. */
export function canonicalJson(value: unknown): string {
	if (Array.isArray(value)) return `[${value.map(canonicalJson).join(',')}]`;
	if (typeof value === 'object' && value !== null) {
		const entries = Object.entries(value)
			.filter(([, field]) => field !== undefined)
			.sort(([a], [b]) => (a < b ? -1 : 1));
		return `{${entries.map(([key, field]) => `${JSON.stringify(key)}:${canonicalJson(field)}`).join(',')}}`;
	}
	if (typeof value === 'number' && !Number.isFinite(value))
		throw new RangeError('JSON has no NaN and no infinities');
	return JSON.stringify(value);
}

export const sha256 = (data: string | Uint8Array): string =>
	`sha256:${createHash('sha256').update(data).digest('hex')}`;
