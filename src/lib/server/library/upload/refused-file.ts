import type { FileIssue } from '../../../schemas/upload-preview.ts';
import { InvalidInput, type Issue } from '../../errors.ts';

const ISSUES_MAX = 100;
const TEXT_MAX = 60;

/** A file that was not taken. Nothing of it is stored. */
export class RefusedFile extends InvalidInput {
	declare readonly issues: (Issue & FileIssue)[];

	constructor(issues: FileIssue[], code: 'invalid' | 'ambiguous' = 'invalid') {
		super(
			issues.length === 1
				? `The file was not taken: ${issues[0].message}`
				: `The file was not taken: ${issues.length} problems, the first in line ${issues[0].line}.`,
			issues.slice(0, ISSUES_MAX).map(placed),
			code
		);
	}
}

/** With a path beside it, as every other problem of the API has. */
function placed(issue: FileIssue): Issue & FileIssue {
	const { line, column, rule, message } = issue;
	const path = column === null ? `file.line[${line}]` : `file.line[${line}].column[${column}]`;
	return { path, line, column, rule, message, text: issue.text.slice(0, TEXT_MAX) };
}

export const refuse = (rule: string, message: string, line = 1, text = ''): never => {
	throw new RefusedFile([{ line, column: null, rule, message, text }]);
};
