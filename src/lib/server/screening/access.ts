import type { SQL } from 'drizzle-orm';
import type { SignedIn } from '../../schemas/person.ts';
import { screening } from '../db/schema/screening.ts';
import { sharedWith } from '../people/sharing.ts';

/** Who sees a screening; only its owner steers it. */
export const seenBy = (actor: SignedIn): SQL => sharedWith(actor, screening, ['signed-in']);
