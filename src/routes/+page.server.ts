import { epsilonShares } from '$lib/engine/index.ts';
import { factsOf } from '$lib/components/studies/facts-of.ts';
import { decodeStudy } from '$lib/schemas/study-address.ts';
import { versionsOf } from '$lib/schemas/study-slots.ts';
import * as versions from '$lib/server/library/versions.ts';
import type { PageServerLoad } from './$types';

/** The study that the address means, and what the library says about each version it names. */
export const load: PageServerLoad = async ({ url }) => {
	const { study, problems } = decodeStudy(url.searchParams);
	const named = versionsOf(study);
	const resolved = await versions.resolve(named);
	const facts = Object.fromEntries(
		[...resolved].map(([ref, version]) => [ref, factsOf(version, epsilonShares)])
	);
	const missing = named
		.filter((ref) => !resolved.has(ref))
		.map((ref) => ({
			part: 'version',
			message: `"${ref}" is not in the library; nothing is computed with it`
		}));
	return { study, facts, problems: [...problems, ...missing] };
};
