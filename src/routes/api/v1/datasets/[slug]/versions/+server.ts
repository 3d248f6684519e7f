import { answering } from '$lib/server/api/problem.ts';
import { serializeVersion, versionApiPath } from '$lib/server/api/serialize/version.ts';
import { personOf } from '$lib/server/auth/require.ts';
import { addVersion } from '$lib/server/library/additions.ts';
import { askedBy } from '$lib/server/library/created.ts';
import { asFileProblem, readPostedVersion } from '$lib/server/library/posted-version.ts';
import { answerOnce } from '$lib/server/library/repeated-request.ts';
import { viewerOf } from '$lib/server/library/viewer.ts';
import * as versions from '$lib/server/library/versions.ts';
import type { RequestHandler } from './$types';

/** A file with its description, or a model with its description, becomes a draft with its checks. */
export const POST: RequestHandler = ({ request, url, params, locals }) =>
	answering(async () => {
		const actor = personOf(locals.principal);
		const { posted, content } = await readPostedVersion(request);
		return answerOnce({ ...askedBy(request, url, actor), content }, async () => {
			try {
				const { number } = await addVersion(actor, params.slug, posted());
				const version = await versions.get(params.slug, number, undefined, viewerOf(locals.principal));
				return Response.json(
					{ version: serializeVersion(version) },
					{
						status: 201,
						headers: { location: versionApiPath(params.slug, number), 'cache-control': 'no-store' }
					}
				);
			} catch (error) {
				throw asFileProblem(error);
			}
		});
	});
