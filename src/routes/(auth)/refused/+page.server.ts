import { FORBIDDEN } from '$lib/server/errors.ts';

/** What the hook shows, with the status of a refusal, in the place of a page that somebody may not see: it can make none itself. */
export const load = () => ({ message: FORBIDDEN });
