import { error } from '@sveltejs/kit';
import { auditFilter, list } from '$lib/server/audit/list.ts';
import { attempt, parseForm } from '$lib/server/people/attempt.ts';
import type { PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ url }) => {
	const cursor = url.searchParams.get('cursor') ?? undefined;
	const found = await attempt(async () => {
		const filter = parseForm(auditFilter, Object.fromEntries(url.searchParams));
		return { filter, ...(await list(filter, cursor)) };
	});
	if (found.failed) {
		error(
			found.status,
			found.refused.issues.map(({ message }) => message).join('; ') || found.refused.message
		);
	}
	return found.value;
};
