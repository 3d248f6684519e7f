import { redirect } from '@sveltejs/kit';
import { resolve } from '$app/paths';
import type { RequestHandler } from './$types';

/** A dataset is seen through its versions. */
export const GET: RequestHandler = ({ params }) => redirect(302, resolve(`/datasets/${params.slug}/latest`));
