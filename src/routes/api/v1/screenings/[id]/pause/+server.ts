import { z } from 'zod';
import { steppedJson } from '$lib/server/library/created.ts';
import * as screenings from '$lib/server/screening/screenings.ts';
import type { RequestHandler } from './$types';

export const POST: RequestHandler = (event) =>
	steppedJson(event, z.strictObject({}), async (actor) => ({
		screening: await screenings.pause(actor, event.params.id)
	}));
