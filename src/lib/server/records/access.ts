import { eq, type SQL } from 'drizzle-orm';
import type { SignedIn } from '../../schemas/person.ts';
import type { Principal } from '../auth/principal.ts';
import { recordAccess } from '../db/schema/record.ts';
import { sharedWith } from '../people/sharing.ts';

/** Who sees a record. What one may not see does not exist. */

/** Null where nobody signed in: then only what is open to everybody is there. */
export function readerOf(principal: Principal): SignedIn | null {
	return principal.kind === 'session' || principal.kind === 'token' ? principal.person : null;
}

export function seenBy(reader: SignedIn | null): SQL {
	if (!reader) return eq(recordAccess.visibility, 'everybody');
	return sharedWith(reader, recordAccess, ['signed-in', 'everybody']);
}
