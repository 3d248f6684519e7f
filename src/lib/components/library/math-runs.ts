/** A line of mathematics cut into runs for lowering and raising: "omega_{p}^{2}" style, as pages set it in the symbol face. */

export interface MathRun {
	text: string;
	place: 'line' | 'lowered' | 'raised';
}

export function mathRuns(line: string): MathRun[] {
	const runs: MathRun[] = [];
	let done = 0;
	for (const match of line.matchAll(/([_^])\{([^}]*)\}/g)) {
		if (match.index > done) runs.push({ text: line.slice(done, match.index), place: 'line' });
		runs.push({ text: match[2], place: match[1] === '_' ? 'lowered' : 'raised' });
		done = match.index + match[0].length;
	}
	if (done < line.length) runs.push({ text: line.slice(done), place: 'line' });
	return runs;
}
