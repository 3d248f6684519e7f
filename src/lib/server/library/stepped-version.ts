import type { SignedIn } from '../../schemas/person.ts';
import { serializeVersion } from '../api/serialize/version.ts';
import { NotFound } from '../errors.ts';
import * as versions from './versions.ts';

/** What a version has become after a step, for whoever took it. */
export async function serializedVersion(
	{ slug, number }: { slug: string; number: string },
	actor: SignedIn
): Promise<unknown> {
	try {
		const viewer = { personId: actor.id, isCurator: true };
		return { version: serializeVersion(await versions.get(slug, number, undefined, viewer)) };
	} catch (error) {
		// A version that went back to its maker is hidden from the reviewer again.
		if (error instanceof NotFound)
			return { version: { ref: versions.refOf(slug, number), number, state: 'draft' } };
		throw error;
	}
}
