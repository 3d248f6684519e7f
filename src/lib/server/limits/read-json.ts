import { BadRequest } from './refusals.ts';

/** Reads a JSON body that may come from anybody: only the stated type, no more than `limit` bytes, no surprises. */
export async function readJson(request: Request, limit: number): Promise<unknown> {
	const type = request.headers.get('content-type')?.split(';')[0].trim().toLowerCase();
	if (type !== 'application/json') {
		throw new BadRequest(
			415,
			'content-type',
			'Send the request as JSON, with content-type: application/json.'
		);
	}
	const text = await readText(request, limit);
	try {
		return JSON.parse(text);
	} catch (error) {
		const where = error instanceof SyntaxError ? ` (${error.message.slice(0, 120)})` : '';
		throw new BadRequest(400, 'malformed', `The body is not JSON${where}.`);
	}
}

async function readText(request: Request, limit: number): Promise<string> {
	const tooLarge = () =>
		new BadRequest(413, 'too-large', `The body may have at most ${limit.toLocaleString('en')} bytes.`);
	// An honest sender is refused before a byte is read; the count below catches the others.
	if (Number(request.headers.get('content-length') ?? 0) > limit) throw tooLarge();
	if (!request.body) return '';
	const decoder = new TextDecoder('utf-8', { fatal: true });
	let size = 0;
	let text = '';
	const reader = request.body.getReader();
	try {
		for (;;) {
			const { done, value } = await reader.read();
			if (done) return text + decoder.decode();
			size += value.byteLength;
			if (size > limit) throw tooLarge();
			text += decoder.decode(value, { stream: true });
		}
	} catch (error) {
		if (error instanceof TypeError) throw new BadRequest(400, 'malformed', 'The body is not UTF-8 text.');
		// The adapter's own limit, where that is the lower one.
		if ((error as { status?: unknown }).status === 413) throw tooLarge();
		throw error;
	} finally {
		reader.releaseLock();
	}
}
