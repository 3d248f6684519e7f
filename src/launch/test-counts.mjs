import { existsSync, readFileSync } from 'node:fs';

/** @typedef {{ passed: number, failed: number }} Counts */

/**
 * What a stage without a report of its own counts as: one check.
 *
 * @param {number} code
 * @returns {Counts}
 */
export function countExit(code) {
	return code === 0 ? { passed: 1, failed: 0 } : { passed: 0, failed: 1 };
}

/**
 * Reads the report of vitest or playwright. Whatever makes the run fail without a failed test in the report (a crash, a
 * file that cannot be loaded, an error outside of tests, nothing run at all) counts as one failure: a broken run must
 * never look like a good one.
 *
 * @param {string} file
 * @param {number} code
 * @returns {Counts}
 */
export function countReport(file, code) {
	const counts = existsSync(file) ? read(JSON.parse(readFileSync(file, 'utf8'))) : { passed: 0, failed: 0 };
	if (counts.failed === 0 && (code !== 0 || counts.passed === 0)) return { ...counts, failed: 1 };
	return counts;
}

/**
 * @param {any} report
 * @returns {Counts}
 */
function read(report) {
	if (report.stats) {
		const { expected, unexpected, flaky } = report.stats;
		// A test that only passes at the second attempt has failed.
		return { passed: expected, failed: unexpected + flaky + (report.errors?.length ?? 0) };
	}
	return { passed: report.numPassedTests, failed: report.numFailedTests };
}
