import { fail, redirect } from '@sveltejs/kit';
import { recordVisibility } from '$lib/schemas/record.ts';
import { decodeStudy } from '$lib/schemas/study-address.ts';
import { personOf } from '$lib/server/auth/require.ts';
import { callerGone } from '$lib/server/limits/caller-gone.ts';
import { chargeComputing } from '$lib/server/limits/computing.ts';
import { attempt, field, parseForm } from '$lib/server/people/attempt.ts';
import { readerOf } from '$lib/server/records/access.ts';
import { plain, sources } from '$lib/server/records/citation.ts';
import { recompute } from '$lib/server/records/recompute.ts';
import { versionsOf } from '$lib/server/records/record-files.ts';
import * as records from '$lib/server/records/records.ts';
import { notesTree } from '$lib/server/studies/notes.ts';
import { z } from 'zod';
import { answered } from '../../../(library)/answered.ts';
import { BASE_UNITS } from '$lib/study-sheet/curve-table.ts';
import { quantityFacts } from '$lib/study-sheet/quantities.ts';
import { rowsOf } from './rows.ts';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ locals, params, url }) => {
	const { record, own } = await answered(() => records.get(readerOf(locals.principal), params.checksum));
	const { content, ...rest } = record;
	const { choices, ...said } = content;
	const { study } = decodeStudy(new URLSearchParams(content.query));
	return {
		...rest,
		own,
		said,
		choices: choices.map(({ letter, name, reason, inputChecksum, warnings, equilibria }) => ({
			...{ letter, name, reason, inputChecksum, warnings, equilibria }
		})),
		quantity: study.quantity,
		unit:
			quantityFacts(study.quantity, study.shape).unit === 'lineForce' ? 'N/m' : BASE_UNITS[study.quantity],
		rows: rowsOf(study, choices),
		notes: notesTree(content.notes),
		citation: plain(record, url.origin),
		sources: sources(await versionsOf(record)),
		origin: url.origin
	};
};

export const actions: Actions = {
	recompute: async ({ request, locals, params, getClientAddress, platform }) => {
		const { gone, forget } = callerGone(request, platform);
		const done = await attempt(async () => {
			const { record } = await records.get(readerOf(locals.principal), params.checksum);
			return recompute(record.content, {
				charge: (seconds) => chargeComputing(getClientAddress(), seconds),
				signal: gone
			});
		}).finally(forget);
		if (done.failed) return fail(done.status, done.refused);
		return { recomputed: done.value };
	},

	share: async ({ request, locals, params }) => {
		const form = await request.formData();
		const done = await attempt(() =>
			records.share(
				personOf(locals.principal),
				params.checksum,
				parseForm(z.object({ visibility: recordVisibility }), { visibility: field(form, 'visibility') })
					.visibility
			)
		);
		if (done.failed) return fail(done.status, done.refused);
		redirect(303, `/records/${params.checksum}`);
	}
};
