import { authSettings } from '$lib/server/auth/settings.ts';
import type { LayoutServerLoad } from './$types';

export const load: LayoutServerLoad = ({ locals }) => {
	const { principal } = locals;
	return {
		account:
			principal.kind === 'session' ? { name: principal.person.name, role: principal.person.role } : null,
		demo: authSettings().demo
	};
};
