export interface Issue {
	/** Place in the request, such as `arrangement.left.layers[0].thicknessNm`. */
	path: string;
	/** What is wrong and what would be right. */
	message: string;
}

/** A request that asks for something absurd or unphysical; every problem found is listed, not the first only. */
export class Refusal extends Error {
	readonly issues: Issue[];

	constructor(issues: Issue[]) {
		super(issues.map(({ path, message }) => `${path}: ${message}`).join('\n'));
		this.name = 'Refusal';
		this.issues = issues;
	}
}
