import { eq, inArray, or, sql, type SQL } from 'drizzle-orm';
import type { Principal } from '../auth/principal.ts';
import { version } from '../db/schema/dataset.ts';

/** Who looks at a version: what has not been published is for its maker and, once submitted, for the curators. */

export interface Viewer {
	personId: string;
	isCurator: boolean;
}

/** Null where nobody signed in: published and withdrawn versions only. */
export function viewerOf(principal: Principal | undefined): Viewer | null {
	if (principal?.kind !== 'session' && principal?.kind !== 'token') return null;
	return { personId: principal.person.id, isCurator: principal.person.role === 'curator' };
}

/** What anybody may see. Withdrawn versions keep their address and say why. */
export const PUBLIC_STATES = ['published', 'withdrawn'] as const;

export function visibleTo(viewer: Viewer | null): SQL | undefined {
	const isPublic = inArray(version.state, PUBLIC_STATES);
	if (!viewer) return isPublic;
	return or(
		isPublic,
		eq(version.createdBy, viewer.personId),
		viewer.isCurator ? eq(version.state, sql`'in_review'`) : undefined
	);
}
