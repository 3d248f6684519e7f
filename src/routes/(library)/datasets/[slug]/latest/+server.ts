import { redirect } from '@sveltejs/kit';
import { resolve } from '$app/paths';
import * as versions from '$lib/server/library/versions.ts';
import { answered } from '../../../answered.ts';
import type { RequestHandler } from './$types';

/** The newest published version; the address of a version is the one to keep. */
export const GET: RequestHandler = async ({ params }) => {
	const number = await answered(() => versions.latestNumber(params.slug));
	redirect(302, resolve(`/datasets/${params.slug}/versions/${number}`));
};
