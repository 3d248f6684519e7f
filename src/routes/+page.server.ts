import { loadStudy } from './(studies)/load-study.ts';
import type { PageServerLoad } from './$types';

/** The study that the address means. */
export const load: PageServerLoad = ({ url }) => loadStudy(url.searchParams);
