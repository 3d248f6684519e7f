import { callerGone } from '$lib/server/limits/caller-gone.ts';
import { chargeComputing } from '$lib/server/limits/computing.ts';
import { fileResponse } from '$lib/server/records/file-response.ts';
import { studyFile } from '$lib/server/studies/study-files.ts';
import { answered } from '../../../(library)/answered.ts';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = ({ params, url, request, getClientAddress, platform }) =>
	answered(async () => {
		const { gone, forget } = callerGone(request, platform);
		const file = await studyFile(url.searchParams, params.file, {
			charge: (seconds) => chargeComputing(getClientAddress(), seconds),
			origin: url.origin,
			signal: gone
		}).finally(forget);
		return fileResponse(file);
	});
