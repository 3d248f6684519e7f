import type { AuditLine } from './list.ts';

/** The trail as CSV. Every cell is text and quoted; what a spreadsheet would take for a formula is defused. */

const HEADS = [
	'id',
	'at',
	'actor',
	'actorName',
	'action',
	'objectType',
	'objectId',
	'objectName',
	'fromState',
	'toState',
	'details',
	'hash'
] as const;

const FORMULA = /^[=+\-@\t\r\0]/;

function cell(value: unknown): string {
	const text = value === null ? '' : typeof value === 'object' ? JSON.stringify(value) : String(value);
	return `"${(FORMULA.test(text) ? `'${text}` : text).replaceAll('"', '""')}"`;
}

export const auditCsvHead = `${HEADS.map(cell).join(',')}\r\n`;

export function auditCsvLine(entry: AuditLine): string {
	return `${HEADS.map((head) => cell(entry[head])).join(',')}\r\n`;
}
