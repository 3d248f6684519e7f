import { freezeFields } from '$lib/schemas/record.ts';
import { createdJson } from '$lib/server/library/created.ts';
import { callerGone } from '$lib/server/limits/caller-gone.ts';
import { chargeComputing } from '$lib/server/limits/computing.ts';
import { freeze } from '$lib/server/records/freeze.ts';
import * as records from '$lib/server/records/records.ts';
import type { RequestHandler } from './$types';

export const POST: RequestHandler = (event) => {
	const { gone, forget } = callerGone(event.request, event.platform);
	return createdJson(event, freezeFields, async (actor, fields) => {
		const checksum = await freeze(actor, event.params.id, fields, {
			charge: (seconds) => chargeComputing(event.getClientAddress(), seconds),
			origin: event.url.origin,
			signal: gone
		});
		return { record: (await records.get(actor, checksum)).record };
	}).finally(forget);
};
