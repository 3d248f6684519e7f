import type { Who } from './auth/access.ts';

/**
 * Who may call what: one row a route, one word a method or form action; auth/access.ts says what the words mean. A route
 * without a row is answered to nobody, and a test walks src/routes so that none is forgotten.
 */

export type Method = 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE';

/** A method, or a named form action as `?/revoke`. */
export type Call = Method | `?/${string}`;

type Row = Partial<Record<Call, Who>>;

const readable: Row = { GET: 'readers' };
const open: Row = { GET: 'everyone' };
const administered: Row = { GET: 'administrators' };

/** Route ids without their groups. */
export const POLICY: Readonly<Record<string, Row>> = {
	'/': readable,
	'/library': readable,
	'/materials/[slug]': readable,
	'/datasets/[slug]': readable,
	'/datasets/[slug]/versions/[number]/[file]': readable,
	'/datasets/[slug]/latest': readable,
	'/datasets/[slug]/versions/[number]': {
		GET: 'readers',
		'?/withdraw': 'reviewers',
		'?/recommend': 'reviewers'
	},
	'/datasets/[slug]/versions/[number]/spectrum.json': readable,
	'/uploads': {
		GET: 'uploaders',
		'?/file': 'uploaders',
		'?/model': 'uploaders',
		'?/remove': 'uploaders',
		'?/from': 'uploaders'
	},
	'/uploads/[id]': { GET: 'uploaders', '?/save': 'uploaders', '?/draft': 'uploaders' },
	'/uploads/[id]/form': { PUT: 'uploaders' },
	'/uploads/material': { GET: 'uploaders', POST: 'uploaders' },
	'/uploads/dataset': { GET: 'uploaders', POST: 'uploaders' },
	'/uploads/source': { GET: 'uploaders', '?/read': 'uploaders', '?/add': 'uploaders' },
	'/drafts/[slug]/[number]': { GET: 'uploaders', '?/keep': 'uploaders', '?/submit': 'uploaders' },
	'/reviews': { GET: 'reviewers' },
	'/reviews/[slug]/[number]': { GET: 'reviewers', '?/approve': 'reviewers', '?/return': 'reviewers' },
	'/reviews/[slug]/[number]/impact': { GET: 'reviewers' },
	'/compare': readable,
	'/sign-in': { GET: 'everyone', '?/link': 'everyone', '?/institution': 'everyone', '?/demo': 'everyone' },
	'/sign-in/confirm': { GET: 'everyone', POST: 'everyone' },
	'/refused': open,
	'/sign-out': { POST: 'everyone' },
	'/invitation': { GET: 'everyone', POST: 'everyone' },
	'/auth/callback/institution': open,
	'/demo/mail': open,
	'/demo/mail/[id]': open,
	'/account': {
		GET: 'people',
		'?/profile': 'people',
		'?/leave': 'people',
		'?/link': 'people',
		'?/unlink': 'people'
	},
	'/account/sessions': { GET: 'people', '?/end': 'people', '?/others': 'people' },
	'/account/tokens': { GET: 'people', '?/create': 'people', '?/revoke': 'people' },
	'/account/data': { GET: 'people', '?/delete': 'people' },
	'/account/data.json': { GET: 'people' },
	'/account/groups/[slug]': {
		GET: 'people',
		'?/rename': 'people',
		'?/invite': 'people',
		'?/revoke': 'people',
		'?/defaults': 'people',
		'?/lead': 'people',
		'?/remove': 'people'
	},
	'/studies': { GET: 'people', '?/create': 'people' },
	'/studies/new': { GET: 'people', POST: 'people' },
	'/studies/[id]': {
		GET: 'people',
		'?/decide': 'people',
		'?/describe': 'people',
		'?/duplicate': 'people',
		'?/archive': 'people'
	},
	'/studies/[id]/state': { PUT: 'people' },
	'/studies/[id]/comments': { GET: 'people', '?/add': 'people', '?/resolve': 'people' },
	'/studies/[id]/freeze': { GET: 'people', POST: 'people' },
	'/studies/[id]/share': { GET: 'people', '?/link': 'people', '?/revoke': 'people', '?/give': 'people' },
	/** The secret in the address is what lets one in. */
	'/shared/[secret]': open,
	'/shared/[secret]/[file]': open,
	'/study/[file]': { GET: 'computing' },
	'/records': readable,
	'/records/[checksum]': { GET: 'readers', '?/recompute': 'computing', '?/share': 'people' },
	'/records/[checksum]/[file]': readable,
	'/studies/[id]/history': { GET: 'people', '?/restore': 'people' },
	'/screenings': { GET: 'people' },
	'/screenings/new': { GET: 'people', '?/count': 'people', '?/start': 'people' },
	'/screenings/[id]': {
		GET: 'people',
		'?/cancel': 'people',
		'?/pause': 'people',
		'?/resume': 'people',
		'?/repeat': 'people',
		'?/share': 'people'
	},
	'/screenings/[id]/progress': { GET: 'people' },
	'/screenings/[id]/rows': { GET: 'people' },
	'/screenings/[id]/why': { GET: 'people' },
	'/screenings/[id]/[file]': { GET: 'people' },
	'/notifications': { GET: 'people', '?/read': 'people', '?/all': 'people' },
	'/administration': administered,
	'/administration/people': administered,
	'/administration/people/[id]': {
		...administered,
		'?/role': 'administrators',
		'?/remove': 'administrators',
		'?/readmit': 'administrators',
		'?/group': 'administrators'
	},
	'/administration/groups': {
		...administered,
		'?/create': 'administrators',
		'?/close': 'administrators',
		'?/reopen': 'administrators'
	},
	'/administration/invitations': {
		...administered,
		'?/invite': 'administrators',
		'?/revoke': 'administrators'
	},
	'/administration/tokens': { ...administered, '?/revoke': 'administrators' },
	'/administration/settings': { ...administered, POST: 'administrators' },
	'/administration/outbox': { ...administered, '?/try': 'administrators' },
	'/administration/audit': administered,
	'/administration/audit.csv': administered,
	'/api/v1/tokens': { GET: 'people-by-token', POST: 'people' },
	'/api/v1/tokens/[id]': { DELETE: 'people' },
	'/api/v1/forces': { POST: 'computing' },
	'/api/v1/studies': { GET: 'people-by-token', POST: 'keepers' },
	'/api/v1/studies/[id]/freeze': { POST: 'keepers' },
	'/api/v1/records/[checksum]': readable,
	'/api/v1/records/[checksum]/recompute': { POST: 'computing' },
	'/api/v1/records/[checksum]/archive.zip': readable,
	'/api/v1/studies/[id]': { GET: 'people-by-token', PATCH: 'keepers' },
	'/api/v1/screenings': { GET: 'people-by-token', POST: 'keepers' },
	'/api/v1/screenings/[id]': { GET: 'people-by-token' },
	'/api/v1/screenings/[id]/cells': { GET: 'people-by-token' },
	'/api/v1/screenings/[id]/cancel': { POST: 'keepers' },
	'/api/v1/screenings/[id]/pause': { POST: 'keepers' },
	'/api/v1/screenings/[id]/resume': { POST: 'keepers' },
	'/api/v1/health': open,
	'/api/v1/openapi.json': open,
	'/api/v1/materials': { GET: 'readers', POST: 'uploaders' },
	'/api/v1/sources': { POST: 'uploaders' },
	'/api/v1/datasets': { POST: 'uploaders' },
	'/api/v1/datasets/[slug]/versions': { POST: 'uploaders' },
	'/api/v1/materials/[slug]': readable,
	'/api/v1/datasets/[slug]/versions/[number]': readable,
	'/api/v1/datasets/[slug]/versions/[number]/model.json': readable,
	'/api/v1/datasets/[slug]/versions/[number]/table.csv': readable,
	'/api/v1/datasets/[slug]/versions/[number]/raw': readable,
	'/api/v1/datasets/[slug]/versions/[number]/citation.bib': readable,
	'/api/v1/datasets/[slug]/versions/[number]/impact': { GET: 'reviewers' },
	'/api/v1/datasets/[slug]/versions/[number]/submit': { POST: 'uploaders' },
	'/api/v1/datasets/[slug]/versions/[number]/approve': { POST: 'reviewers' },
	'/api/v1/datasets/[slug]/versions/[number]/return': { POST: 'reviewers' },
	'/api/v1/datasets/[slug]/versions/[number]/withdraw': { POST: 'reviewers' }
};

/** `/(library)/materials/[slug]` as `/materials/[slug]`: groups order files, not rights. */
export function withoutGroups(routeId: string): string {
	return routeId.replace(/\/\([^)]+\)/g, '') || '/';
}

/** Which row's word counts for a request: the form action that it names, or its method. */
export function callOf(method: string, query: URLSearchParams): string {
	if (method !== 'POST') return method;
	const action = [...query.keys()].find((key) => key.startsWith('/'));
	return action === undefined ? method : `?${action}`;
}

/** Undefined where nobody may. */
export function whoMay(routeId: string, call: string): Who | undefined {
	const id = withoutGroups(routeId);
	const row = Object.hasOwn(POLICY, id) ? POLICY[id] : undefined;
	// HEAD and OPTIONS tell nothing that GET does not.
	const asked = call === 'HEAD' || call === 'OPTIONS' ? 'GET' : call;
	if (row && Object.hasOwn(row, asked)) return row[asked as Call];
	return call === 'OPTIONS' && row ? 'everyone' : undefined;
}
