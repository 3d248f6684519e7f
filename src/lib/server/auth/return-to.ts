/** Where to go after signing in: a path of this installation, never another site's. */
export function returnTo(text: string | null, otherwise = '/'): string {
	if (!text || !text.startsWith('/') || /[\\\p{Cc}]/u.test(text)) return otherwise;
	const here = 'http://here.invalid';
	return URL.canParse(text, here) && new URL(text, here).origin === here ? text : otherwise;
}
