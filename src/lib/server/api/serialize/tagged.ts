import { createHash } from 'node:crypto';

/** Answers with an ETag of their content: a caller that has them already is told so without the body. */

const tagOf = (body: string | Uint8Array): string =>
	`"${createHash('sha256').update(body).digest('base64url')}"`;

/** A list of tags, each possibly weak; `*` means any. */
function isKnown(header: string | null, tag: string): boolean {
	if (!header) return false;
	const tags = header.split(',').map((one) => one.trim().replace(/^W\//, ''));
	return tags.includes('*') || tags.includes(tag);
}

function tagged(
	request: Request,
	body: string | Uint8Array<ArrayBuffer>,
	headers: Record<string, string>
): Response {
	const etag = tagOf(body);
	const all = { ...headers, etag, 'cache-control': 'no-cache' };
	return isKnown(request.headers.get('if-none-match'), etag)
		? new Response(null, { status: 304, headers: { etag, 'cache-control': 'no-cache' } })
		: new Response(body, { headers: all });
}

export const taggedJson = (
	request: Request,
	value: unknown,
	headers: Record<string, string> = {}
): Response => tagged(request, JSON.stringify(value), { 'content-type': 'application/json', ...headers });

/** A file to be kept. Quotes and anything outside printable ASCII cannot stand in the name. */
export function taggedFile(
	request: Request,
	body: string | Uint8Array<ArrayBuffer>,
	contentType: string,
	name: string
): Response {
	const safe = name.replace(/[^\w.@+-]/g, '_');
	return tagged(request, body, {
		'content-type': contentType,
		'content-disposition': `attachment; filename="${safe}"`,
		'x-content-type-options': 'nosniff'
	});
}
