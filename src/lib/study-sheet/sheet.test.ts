import { describe, expect, it } from 'vitest';
import { signRuns } from './sign-runs.ts';
import type { DrawnChoice } from './strip.ts';
import { brokenLines, sheetSvg, type Sheet } from './sheet.ts';

function choice(letter: string, ink: number, values: number[]): DrawnChoice {
	const separationsNm = [1, 100, 10_000].slice(0, values.length);
	const series = { separationsNm, values, bounds: values.map(() => 1e-9), met: values.map(() => true) };
	return {
		...{ letter, ink, name: letter, series, previous: null, band: null, runs: signRuns(series) },
		shares: { separationsNm: [], static: [], te: [] },
		difference: null,
		ratio: { ...series, values: values.map((value) => value / 10) }
	};
}

const sheet: Sheet = {
	title: 'Gold & silica <"thin">',
	magnitudeLabel: 'Pressure in Pa',
	legend: 'solid line attracts',
	comparisonLabel: 'Ratio',
	comparisonInPercent: false,
	decadeLabel: (value) => `${value} nm`,
	...{ fromNm: 1, toNm: 10_000, atNm: 38, unitSize: 1 },
	choices: [choice('A', 2, [-5, 0.3, 0.001]), choice('B', 3, [])],
	words: { '-1': 'attracts', '0': 'no force', '1': 'repels' },
	block: ['Gold, version 1.0', 'http://localhost/?left=a&right=b'],
	colour: (token) => `token-${token}`
};

/** A reader of the few constructs that the sheet uses; throws where a tag is not closed in its turn. */
function wellFormed(svg: string): boolean {
	const open: string[] = [];
	for (const [, closing, name] of svg.matchAll(/<(\/?)([a-z]+)(?:\s[a-z-]+="[^"<]*")*>/gi)) {
		if (closing === '') open.push(name);
		else if (open.pop() !== name) return false;
	}
	return open.length === 0 && !/&(?!amp;|lt;|gt;|quot;)/.test(svg);
}

describe('the picture to take away', () => {
	const svg = sheetSvg(sheet);

	it('is well formed whatever the title holds', () => {
		expect(wellFormed(svg)).toBe(true);
		expect(svg).toContain('Gold &amp; silica &lt;&quot;thin&quot;&gt;');
	});

	it('carries the title block and the address as text', () => {
		expect(svg).toContain('Gold, version 1.0');
		expect(svg).toContain('?left=a&amp;right=b');
	});

	it('has both words of the sign, and no number that is none', () => {
		expect(svg).toContain('>attracts<');
		expect(svg).toContain('>repels<');
		expect(svg).not.toMatch(/NaN|undefined|Infinity/);
	});

	it('refers to nothing outside', () => {
		expect(svg.replace('xmlns="http://www.w3.org/2000/svg"', '')).not.toMatch(/(href|src|url\()/);
	});
});

describe('brokenLines', () => {
	it('breaks at blanks, and inside what has none, without losing a letter of it', () => {
		expect(brokenLines(['one two three four'], 10)).toEqual(['one two', 'three four']);
		const address = `https://gap.larkmoor.example/?${'left=gold&'.repeat(30)}`;
		const lines = brokenLines([address], 100);
		expect(lines.every((line) => line.length <= 100)).toBe(true);
		expect(lines.join('')).toBe(address);
		expect(brokenLines(['short'])).toEqual(['short']);
	});
});
