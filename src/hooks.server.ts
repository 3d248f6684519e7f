import {
	error,
	redirect,
	type Handle,
	type HandleServerError,
	type RequestEvent,
	type ServerInit
} from '@sveltejs/kit';
import { sequence } from '@sveltejs/kit/hooks';
import { building } from '$app/environment';
import { logUnforeseen, problemResponse } from '$lib/server/api/problem.ts';
import { closeEnginePool, enginePool } from '$lib/server/compute/pool.ts';
import { closeDatabase } from '$lib/server/db/client.ts';
import { NOBODY } from '$lib/server/auth/principal.ts';
import { logRequest } from '$lib/server/hooks/request-log.ts';
import { isForeign } from '$lib/server/hooks/same-origin.ts';
import { identify, permit, personal, unauthenticated } from '$lib/server/hooks/session.ts';
import { withSecurityHeaders } from '$lib/server/hooks/security-headers.ts';
import { checkStart } from '$lib/server/hooks/start.ts';
import { FORBIDDEN, Forbidden, NotFound } from '$lib/server/errors.ts';
import { BadRequest } from '$lib/server/limits/refusals.ts';
import { startPeople, stopPeople } from '$lib/server/people/start.ts';
import { callOf, whoMay } from '$lib/server/policy.ts';

export const init: ServerInit = async () => {
	if (building) return;
	await checkStart(process.env);
	await startPeople();
	// Open connections and threads would keep the process alive after the last answer.
	process.once('sveltekit:shutdown', async () => {
		await stopPeople();
		await Promise.all([closeEnginePool(), closeDatabase()]);
	});
	if (process.connected) {
		// Whoever started this process and holds a channel to it is gone: nobody would ever stop it.
		process.once('disconnect', () => process.kill(process.pid, 'SIGTERM'));
		process.channel?.unref();
	}
	// Threads take a moment to load the engine; the first person should not wait for that.
	enginePool();
};

const logged: Handle = async ({ event, resolve }) => {
	const startedAt = performance.now();
	const response = await resolve(event);
	logRequest({ method: event.request.method, route: event.route.id, status: response.status, startedAt });
	return response;
};

const secured: Handle = async ({ event, resolve }) =>
	withSecurityHeaders(asGone(event, await resolve(event)), event.url.protocol === 'https:');

/** What was withdrawn keeps its page and answers that it is gone; data that a page asks for are no page. */
const asGone = ({ locals, isDataRequest }: RequestEvent, response: Response) =>
	locals.gone && !isDataRequest && response.status === 200
		? new Response(response.body, { status: 410, headers: response.headers })
		: response;

const sameOrigin: Handle = ({ event, resolve }) => {
	if (!isForeign(event.request, event.url.origin)) return resolve(event);
	return problemResponse(new BadRequest(403, 'foreign-origin', 'This request was caused by another site.'));
};

const identified: Handle = async ({ event, resolve }) => {
	event.locals.principal = NOBODY;
	try {
		event.locals.principal = await identify(event.request, (name) => event.cookies.get(name));
	} catch (refusal) {
		// Nobody signs in while the database is away; under /api a token may also have been used too often.
		return problemResponse(refusal);
	}
	return personal(await resolve(event), event.locals.principal);
};

const accepts = (request: Request, type: string) => (request.headers.get('accept') ?? '').includes(type);

/** Only what the policy table names is answered, and to whom it says; under /api every answer is JSON. */
const permitted: Handle = async ({ event, resolve }) => {
	const { id } = event.route;
	const { pathname, search, searchParams } = event.url;
	const isApi = pathname.startsWith('/api/');
	if (id === null) {
		if (!isApi) return resolve(event);
		return problemResponse(new NotFound(`There is nothing at ${pathname}; see /api/v1/openapi.json.`));
	}
	const { method } = event.request;
	const who = whoMay(id, callOf(method, searchParams));
	if (!who) {
		return problemResponse(
			new BadRequest(405, 'method', `${method} is not answered here; see /api/v1/openapi.json.`)
		);
	}
	const verdict = await permit(who, event.locals.principal);
	if (verdict === 'yes') return resolve(event);
	if (verdict === 'forbidden') {
		if (isApi) return problemResponse(new Forbidden(FORBIDDEN));
		const wantsPage = method === 'GET' && !event.isDataRequest && accepts(event.request, 'text/html');
		if (wantsPage) {
			const page = await event.fetch('/refused', { headers: { accept: 'text/html' } });
			return new Response(page.body, { status: 403, headers: page.headers });
		}
		error(403, FORBIDDEN);
	}
	if (isApi || event.locals.principal.kind === 'unknown') {
		return unauthenticated();
	}
	redirect(303, `/sign-in?to=${encodeURIComponent(method === 'GET' ? pathname + search : pathname)}`);
};

export const handle = sequence(logged, secured, sameOrigin, identified, permitted);

export const handleError: HandleServerError = ({ error, event, status, message }) => {
	if (status < 500) return { message };
	const id = logUnforeseen(error, { method: event.request.method, route: event.route.id });
	return { message: 'Something went wrong here, and it has been logged.', id };
};
