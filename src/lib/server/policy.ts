/**
 * Who may call what: one row a route, one word a method. A route without a row is answered to nobody, and a test walks
 * src/routes so that none is forgotten. Form actions count as POST.
 */

export type Method = 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE';

/** `everyone`: no sign-in needed; what a caller may use of it is limited elsewhere (limits/). */
export type Who = 'everyone';

type Row = Partial<Record<Method, Who>>;

const readable: Row = { GET: 'everyone' };

/** Route ids without their groups. */
export const POLICY: Readonly<Record<string, Row>> = {
	'/': readable,
	'/library': readable,
	'/materials/[slug]': readable,
	'/datasets/[slug]/latest': readable,
	'/datasets/[slug]/versions/[number]': readable,
	'/datasets/[slug]/versions/[number]/spectrum.json': readable,
	'/api/v1/forces': { POST: 'everyone' },
	'/api/v1/health': readable,
	'/api/v1/openapi.json': readable,
	'/api/v1/materials': readable,
	'/api/v1/materials/[slug]': readable,
	'/api/v1/datasets/[slug]/versions/[number]': readable,
	'/api/v1/datasets/[slug]/versions/[number]/model.json': readable,
	'/api/v1/datasets/[slug]/versions/[number]/table.csv': readable,
	'/api/v1/datasets/[slug]/versions/[number]/raw': readable,
	'/api/v1/datasets/[slug]/versions/[number]/citation.bib': readable
};

/** `/(library)/materials/[slug]` as `/materials/[slug]`: groups order files, not rights. */
export function withoutGroups(routeId: string): string {
	return routeId.replace(/\/\([^)]+\)/g, '') || '/';
}

/** Undefined where nobody may. */
export function whoMay(routeId: string, method: string): Who | undefined {
	const id = withoutGroups(routeId);
	const row = Object.hasOwn(POLICY, id) ? POLICY[id] : undefined;
	// HEAD and OPTIONS tell nothing that GET does not.
	const asked = method === 'HEAD' || method === 'OPTIONS' ? 'GET' : method;
	return row?.[asked as Method] ?? (method === 'OPTIONS' && row ? 'everyone' : undefined);
}
