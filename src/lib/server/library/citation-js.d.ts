/** The parts of the BibTeX reader that are used; the package has no types of its own. */

declare module '@citation-js/core' {
	export class Cite {
		constructor(input: string, options: { forceType: string });
		/** CSL-JSON. */
		readonly data: unknown[];
	}
}

declare module '@citation-js/plugin-bibtex';
