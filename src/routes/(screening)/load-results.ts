import type { SignedIn } from '$lib/schemas/person.ts';
import { resultsOf } from '$lib/server/screening/results.ts';
import * as screenings from '$lib/server/screening/screenings.ts';

/** A screening that somebody may see, with what is computed of it. */
export async function loadResults(actor: SignedIn, id: string) {
	const found = await screenings.get(actor, id);
	const { plan, statement, chunksDone, cells } = found.row;
	return { found, ...(await resultsOf({ id, plan, criterion: statement.criterion, chunksDone, cells })) };
}
