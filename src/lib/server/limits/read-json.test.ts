import { describe, expect, it } from 'vitest';
import { readJson } from './read-json.ts';

function post(body: BodyInit, type = 'application/json', headers: Record<string, string> = {}): Request {
	return new Request('http://localhost/', {
		method: 'POST',
		body,
		headers: { 'content-type': type, ...headers }
	});
}

describe('readJson', () => {
	it.each(['application/json', 'application/json; charset=utf-8', 'Application/JSON'])(
		'reads %s',
		async (type) => {
			expect(await readJson(post('{"a":[1,2]}', type), 100)).toEqual({ a: [1, 2] });
		}
	);

	it.each(['text/plain', 'application/x-www-form-urlencoded', 'text/json', ''])(
		'refuses the type "%s"',
		async (type) => {
			await expect(readJson(post('{}', type), 100)).rejects.toMatchObject({ status: 415 });
		}
	);

	it.each(['', '{', '{"a":}', 'NaN', '\u0000'])('refuses %j as malformed', async (text) => {
		await expect(readJson(post(text), 100)).rejects.toMatchObject({ status: 400, code: 'malformed' });
	});

	it('refuses bytes that are not UTF-8', async () => {
		await expect(readJson(post(new Uint8Array([0x22, 0xff, 0xfe, 0x22])), 100)).rejects.toMatchObject({
			status: 400,
			code: 'malformed'
		});
	});

	it('refuses a body over the limit by its stated length', async () => {
		await expect(readJson(post('{}', undefined, { 'content-length': '1000' }), 100)).rejects.toMatchObject({
			status: 413
		});
	});

	it('stops reading a body that turns out to be over the limit', async () => {
		let sent = 0;
		const endless = new ReadableStream<Uint8Array>({
			pull(controller) {
				sent += 1;
				controller.enqueue(new Uint8Array(64).fill(0x20));
			}
		});
		const request = new Request('http://localhost/', {
			method: 'POST',
			body: endless,
			headers: { 'content-type': 'application/json' },
			duplex: 'half'
		} as RequestInit);
		await expect(readJson(request, 1000)).rejects.toMatchObject({ status: 413 });
		expect(sent).toBeLessThan(30);
	});

	it('parses a hundred thousand levels without falling over', async () => {
		const deep = '['.repeat(100_000) + ']'.repeat(100_000);
		expect(Array.isArray(await readJson(post(deep), 1_000_000))).toBe(true);
	});
});
