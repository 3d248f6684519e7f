import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { countExit, countReport } from './test-counts.mjs';

const folder = mkdtempSync(join(tmpdir(), 'counts-'));
afterAll(() => rmSync(folder, { recursive: true }));

function report(content: object): string {
	const file = join(folder, 'report.json');
	writeFileSync(file, JSON.stringify(content));
	return file;
}

const vitest = (passed: number, failed: number) => report({ numPassedTests: passed, numFailedTests: failed });
const browser = (expected: number, unexpected: number, flaky = 0, errors: object[] = []) =>
	report({ stats: { expected, unexpected, flaky, skipped: 0 }, errors });

describe('countReport', () => {
	it('takes the numbers of the report', () => {
		expect(countReport(vitest(7, 2), 1)).toEqual({ passed: 7, failed: 2 });
		expect(countReport(browser(5, 1), 1)).toEqual({ passed: 5, failed: 1 });
		expect(countReport(vitest(7, 0), 0)).toEqual({ passed: 7, failed: 0 });
	});

	it('counts a test that only passed at a second attempt, and an error outside of tests, as failed', () => {
		expect(countReport(browser(5, 0, 2), 0)).toEqual({ passed: 5, failed: 2 });
		expect(countReport(browser(5, 0, 0, [{}]), 1)).toEqual({ passed: 5, failed: 1 });
	});

	it('counts a run that broke as one failure', () => {
		expect(countReport(vitest(7, 0), 1)).toEqual({ passed: 7, failed: 1 });
		expect(countReport(join(folder, 'none.json'), 1)).toEqual({ passed: 0, failed: 1 });
	});

	it('does not take a run of nothing for a success', () => {
		expect(countReport(vitest(0, 0), 0)).toEqual({ passed: 0, failed: 1 });
		expect(countReport(join(folder, 'none.json'), 0)).toEqual({ passed: 0, failed: 1 });
	});
});

describe('countExit', () => {
	it('is one check', () => {
		expect(countExit(0)).toEqual({ passed: 1, failed: 0 });
		expect(countExit(2)).toEqual({ passed: 0, failed: 1 });
	});
});
