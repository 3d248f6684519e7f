import { authSettings } from '$lib/server/auth/settings.ts';
import type { AccountSummary, Preferences } from '$lib/schemas/person.ts';
import type { LayoutServerLoad } from './$types';

export const load: LayoutServerLoad = ({ locals }) => {
	const { principal } = locals;
	return {
		account:
			principal.kind === 'session'
				? {
						name: principal.person.name,
						role: principal.person.role,
						units: unitsOf(principal.person.preferences)
					}
				: null,
		demo: authSettings().demo
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
