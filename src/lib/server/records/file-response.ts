import type { RecordFile } from './record-files.ts';

/** Pictures are shown in place, everything else is saved. Who may see a record can change, so nobody else keeps it. */
export function fileResponse({ name, type, content }: Omit<RecordFile, 'type'> & { type: string }): Response {
	const shown = type === 'image/svg+xml';
	const body = typeof content === 'string' ? content : new Uint8Array(content);
	return new Response(body, {
		headers: {
			'content-type': type,
			'content-disposition': `${shown ? 'inline' : 'attachment'}; filename="${name}"`,
			'cache-control': 'private, no-cache'
		}
	});
}
