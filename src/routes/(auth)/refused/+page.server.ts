import { error } from '@sveltejs/kit';
import { FORBIDDEN } from '$lib/server/errors.ts';

/** What the hook shows in the place of a page that somebody may not see: it can make no page itself. */
export const load = () => error(403, FORBIDDEN);
