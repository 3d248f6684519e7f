import { answering } from '$lib/server/api/problem.ts';
import { readerOf } from '$lib/server/records/access.ts';
import { fileResponse } from '$lib/server/records/file-response.ts';
import { recordFile } from '$lib/server/records/record-files.ts';
import * as records from '$lib/server/records/records.ts';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = ({ params, locals, url }) =>
	answering(async () => {
		const found = await records.get(readerOf(locals.principal), params.checksum);
		return fileResponse(await recordFile(found, 'archive.zip', url.origin));
	});
