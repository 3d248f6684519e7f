/** Somebody at a browser without script: cookies, forms, redirects that are looked at before they are followed. */

export interface Visitor {
	cookies: Map<string, string>;
	request: (path: string, init?: RequestInit) => Promise<Response>;
	get: (path: string) => Promise<Response>;
	/** Sends a form as its page would. */
	form: (path: string, fields: Record<string, string>) => Promise<Response>;
}

/**
 * @param client  the address that the server is to see, by the header that it is told to trust
 */
export function visitor(origin: string, client = '192.0.2.1'): Visitor {
	const cookies = new Map<string, string>();
	const request = async (path: string, init: RequestInit = {}) => {
		const headers = new Headers(init.headers);
		if (cookies.size > 0) {
			headers.set('cookie', [...cookies].map(([name, value]) => `${name}=${value}`).join('; '));
		}
		headers.set('x-test-client', client);
		// As a browser without script: the answer to a form is a page.
		if (!headers.has('accept')) headers.set('accept', 'text/html');
		if (init.method && init.method !== 'GET' && !headers.has('origin')) headers.set('origin', origin);
		const url = path.startsWith('http') ? path : `${origin}${path}`;
		const response = await fetch(url, { ...init, headers, redirect: 'manual' });
		for (const line of response.headers.getSetCookie()) {
			const [pair, ...attributes] = line.split(';');
			const at = pair.indexOf('=');
			const gone = attributes.some((text) => /max-age=0\b|expires=Thu, 01 Jan 1970/i.test(text));
			if (gone) cookies.delete(pair.slice(0, at));
			else cookies.set(pair.slice(0, at), pair.slice(at + 1));
		}
		return response;
	};
	return {
		cookies,
		request,
		get: (path) => request(path),
		form: (path, fields) => request(path, { method: 'POST', body: new URLSearchParams(fields) })
	};
}

/** Enters as an account of demo mode. */
export async function signedInAs(origin: string, account: string, client?: string): Promise<Visitor> {
	const person = visitor(origin, client);
	const response = await person.form('/sign-in?/demo', { account });
	if (response.status !== 303) throw new Error(`${account} was not let in: ${response.status}`);
	return person;
}

/** Whom the account page greets; null where it sends to the sign-in. */
export async function whoIs(person: Visitor): Promise<string | null> {
	const response = await person.get('/account');
	if (response.status !== 200) return null;
	return /<h1[^>]*>([^<]*)<\/h1>/.exec(await response.text())?.[1] ?? null;
}
