/** A few words about a browser, enough for its owner to tell one session from another. */

const BROWSERS: readonly [RegExp, string][] = [
	[/Edg\//, 'Edge'],
	[/OPR\//, 'Opera'],
	[/Firefox\//, 'Firefox'],
	[/Chrom(e|ium)\//, 'Chrome'],
	[/Safari\//, 'Safari']
];

const SYSTEMS: readonly [RegExp, string][] = [
	[/Android/, 'Android'],
	[/iPhone|iPad/, 'iOS'],
	[/Windows/, 'Windows'],
	[/Mac OS X/, 'macOS'],
	[/CrOS/, 'ChromeOS'],
	[/Linux/, 'Linux']
];

export function browserWords(userAgent: string | null): string {
	const text = userAgent ?? '';
	const browser = BROWSERS.find(([pattern]) => pattern.test(text))?.[1];
	const system = SYSTEMS.find(([pattern]) => pattern.test(text))?.[1];
	if (!browser) return 'a program';
	return system ? `${browser} on ${system}` : browser;
}
