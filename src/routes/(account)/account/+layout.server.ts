import { personOf } from '$lib/server/auth/require.ts';
import type { LayoutServerLoad } from './$types';

export const load: LayoutServerLoad = ({ locals }) => {
	const { name, email, role, groups } = personOf(locals.principal);
	return { me: { name, email, role, groups } };
};
