import { describe, expect, it } from 'vitest';
import { returnTo } from './return-to.ts';

describe('returnTo', () => {
	it.each(['/', '/library?search=gold', '/account/tokens'])('goes back to %s', (path) => {
		expect(returnTo(path)).toBe(path);
	});

	it.each([
		null,
		'',
		'library',
		'//',
		'//:99999',
		'//evil.example',
		'/\\evil.example',
		'https://evil.example',
		'/\t/evil.example',
		'javascript:alert(1)'
	])('does not go to %j', (path) => {
		expect(returnTo(path)).toBe('/');
	});
});
