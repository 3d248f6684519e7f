import { describe, expect, it } from 'vitest';
import { curveSnippets } from './snippets.ts';

const REQUEST = {
	arrangement: {
		left: { layers: [], substrate: { version: "gold-o'brien@1.0" } },
		medium: { version: 'vacuum@1.0' },
		right: { layers: [], substrate: { version: 'silica@1.0' } }
	},
	separationsNm: [10, 1e-3 + 0.1]
};

describe('curveSnippets', () => {
	it('hold the request so that each language reads it back', () => {
		const [python, shell] = curveSnippets('https://gap.larkmoor.example', REQUEST);
		const body = /data='''([\s\S]*?)'''\.encode/.exec(python.text)?.[1] ?? '';
		expect(JSON.parse(body)).toEqual(REQUEST);
		// As a shell reads it: '\'' is one quotation mark.
		const quoted = /--data '([\s\S]*)'\n$/.exec(shell.text)?.[1] ?? '';
		expect(JSON.parse(quoted.replaceAll("'\\''", "'"))).toEqual(REQUEST);
	});

	it('name the installation and hold no token', () => {
		for (const { text } of curveSnippets('https://gap.larkmoor.example', REQUEST)) {
			expect(text).toContain('https://gap.larkmoor.example/api/v1/forces');
			expect(text).toMatch(/Bearer ("|\$)/);
		}
	});
});
