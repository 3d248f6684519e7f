/** Sentences for what a sign-in through the institution can end with; the address carries the word only. */

const SENTENCES: Record<string, string> = {
	'not-linked':
		'An account with your address exists already. Sign in by mail, then link the institution on your account page.',
	'no-group':
		'None of your groups at the institution opens this installation. Ask an administrator for an invitation.',
	unverified:
		'The institution does not vouch for your e-mail address, so no account was made. Ask an administrator for an invitation.',
	institution: 'The sign-in through the institution was not completed. Try again, or sign in by mail.',
	'linked-elsewhere': 'That account of the institution is linked to another account here.'
};

export function signInProblem(word: string | null): string | null {
	return word !== null && Object.hasOwn(SENTENCES, word) ? SENTENCES[word] : null;
}
