import { factsOf } from '$lib/server/library/facts-of.ts';
import { epsilonShares } from '$lib/engine/index.ts';
import { decodeStudy } from '$lib/schemas/study-address.ts';
import { versionsOf } from '$lib/schemas/study-slots.ts';
import * as versions from '$lib/server/library/versions.ts';

/** The study that a query means, and what the library says about each version that it names. */
export async function loadStudy(query: URLSearchParams) {
	const { study, problems } = decodeStudy(query);
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
}
