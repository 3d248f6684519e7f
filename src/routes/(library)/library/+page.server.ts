import * as search from '$lib/server/library/search.ts';
import { answered } from '../answered.ts';
import { decodeView } from './decode-view.ts';
import type { PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ url }) => {
	const { view, problems } = decodeView(url.searchParams);
	return { view, problems, library: await answered(() => search.rows(view)) };
};
