import { callerGone } from '$lib/server/limits/caller-gone.ts';
import { chargeComputing } from '$lib/server/limits/computing.ts';
import { fileResponse } from '$lib/server/records/file-response.ts';
import { open } from '$lib/server/studies/links.ts';
import { studyFile } from '$lib/server/studies/study-files.ts';
import { answered } from '../../../../(library)/answered.ts';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = ({ params, url, request, getClientAddress, platform }) =>
	answered(async () => {
		const { study } = await open(params.secret);
		const { gone, forget } = callerGone(request, platform);
		const file = await studyFile(new URLSearchParams(study.query), params.file, {
			charge: (seconds) => chargeComputing(getClientAddress(), seconds),
			origin: url.origin,
			signal: gone
		}).finally(forget);
		return fileResponse(file);
	});
