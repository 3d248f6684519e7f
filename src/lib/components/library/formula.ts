/** A chemical formula cut into runs, so that a page can lower the counts: SiO2, (C2F4)n, In2O3:Sn. */

export interface FormulaRun {
	text: string;
	lowered: boolean;
}

/**
 * A count follows a letter or a closing bracket; a number at the start or after a dot multiplies and stays up.
 * The n of a polymer counts only after a bracket, because Sn, Zn and In end in the same letter.
 */
const COUNT = /(?<=[A-Za-z)\]])\d+(?:\.\d+)?|(?<=[)\]])n(?![a-z])/g;

export function formulaRuns(formula: string): FormulaRun[] {
	const runs: FormulaRun[] = [];
	let done = 0;
	for (const match of formula.matchAll(COUNT)) {
		if (match.index > done) runs.push({ text: formula.slice(done, match.index), lowered: false });
		runs.push({ text: match[0], lowered: true });
		done = match.index + match[0].length;
	}
	if (done < formula.length) runs.push({ text: formula.slice(done), lowered: false });
	return runs;
}
