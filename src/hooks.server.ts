import type { Handle, HandleServerError, ServerInit } from '@sveltejs/kit';
import { sequence } from '@sveltejs/kit/hooks';
import { building } from '$app/environment';
import { logUnforeseen, problemResponse } from '$lib/server/api/problem.ts';
import { closeEnginePool, enginePool } from '$lib/server/compute/pool.ts';
import { closeDatabase } from '$lib/server/db/client.ts';
import { logRequest } from '$lib/server/hooks/request-log.ts';
import { isForeign } from '$lib/server/hooks/same-origin.ts';
import { withSecurityHeaders } from '$lib/server/hooks/security-headers.ts';
import { checkStart } from '$lib/server/hooks/start.ts';
import { NotFound } from '$lib/server/errors.ts';
import { BadRequest } from '$lib/server/limits/refusals.ts';
import { whoMay } from '$lib/server/policy.ts';

export const init: ServerInit = async () => {
	if (building) return;
	await checkStart(process.env);
	// Open connections and threads would keep the process alive after the last answer.
	process.once('sveltekit:shutdown', () => Promise.all([closeEnginePool(), closeDatabase()]));
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
	withSecurityHeaders(await resolve(event), event.url.protocol === 'https:');

const sameOrigin: Handle = ({ event, resolve }) => {
	if (!isForeign(event.request, event.url.origin)) return resolve(event);
	return problemResponse(new BadRequest(403, 'foreign-origin', 'This request was caused by another site.'));
};

/** Only what the policy table names is answered; under /api every answer is JSON. */
const permitted: Handle = ({ event, resolve }) => {
	const { id } = event.route;
	if (id === null) {
		if (!event.url.pathname.startsWith('/api/')) return resolve(event);
		return problemResponse(
			new NotFound(`There is nothing at ${event.url.pathname}; see /api/v1/openapi.json.`)
		);
	}
	if (whoMay(id, event.request.method)) return resolve(event);
	return problemResponse(
		new BadRequest(405, 'method', `${event.request.method} is not answered here; see /api/v1/openapi.json.`)
	);
};

export const handle = sequence(logged, secured, sameOrigin, permitted);

export const handleError: HandleServerError = ({ error, event, status, message }) => {
	if (status < 500) return { message };
	const id = logUnforeseen(error, { method: event.request.method, route: event.route.id });
	return { message: 'Something went wrong here, and it has been logged.', id };
};
