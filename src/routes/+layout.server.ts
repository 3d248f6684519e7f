import { authSettings } from '$lib/server/auth/settings.ts';
import type { AccountSummary, Preferences } from '$lib/schemas/person.ts';
import { waitingFor } from '$lib/server/library/reviewing.ts';
import { unread } from '$lib/server/notifications/list.ts';
import type { LayoutServerLoad } from './$types';

export const load: LayoutServerLoad = async ({ locals }) => {
	const { principal } = locals;
	const { demo } = authSettings();
	if (principal.kind !== 'session') return { account: null, waiting: null, demo };
	const { id, name, role, preferences } = principal.person;
	const [notifications, reviews] = await Promise.all([unread(id), role === 'curator' ? waitingFor(id) : 0]);
	return {
		account: { name, role, units: unitsOf(preferences) },
		/** What the head of every page counts. */
		waiting: { notifications, reviews },
		demo
	};
};

const symbol = (unit: string) => (unit === 'um' ? 'µm' : unit);

function unitsOf({ separationUnit, pressureUnit, energyUnit }: Preferences): AccountSummary['units'] {
	return {
		...(separationUnit === 'auto' ? {} : { length: symbol(separationUnit) }),
		...(pressureUnit === 'auto' ? {} : { pressure: pressureUnit }),
		photon: energyUnit
	};
}
