import { ENGINE_VERSION } from '$lib/engine/index.ts';
import { answering } from '$lib/server/api/problem.ts';
import { databaseAnswers } from '$lib/server/limits/database.ts';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = () =>
	answering(async () => {
		const database = await databaseAnswers();
		return Response.json(
			{ status: database ? 'ok' : 'down', database, engine: ENGINE_VERSION },
			{ status: database ? 200 : 503, headers: { 'cache-control': 'no-store' } }
		);
	});
