import { readerOf } from '$lib/server/records/access.ts';
import { recordFile } from '$lib/server/records/record-files.ts';
import * as records from '$lib/server/records/records.ts';
import { answered } from '../../../../(library)/answered.ts';
import { fileResponse } from '$lib/server/records/file-response.ts';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = ({ params, locals, url }) =>
	answered(async () => {
		const found = await records.get(readerOf(locals.principal), params.checksum);
		return fileResponse(await recordFile(found, params.file, url.origin));
	});
