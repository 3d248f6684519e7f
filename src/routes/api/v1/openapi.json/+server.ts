import { openApiDocument } from '$lib/server/api/openapi.ts';
import { answering } from '$lib/server/api/problem.ts';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = () =>
	answering(() => Response.json(openApiDocument(), { headers: { 'cache-control': 'public, max-age=300' } }));
