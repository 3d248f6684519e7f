import { describe, expect, it } from 'vitest';
import { UPLOAD_BYTES_MAX, decode } from './decode.ts';
import { RefusedFile } from './refused-file.ts';

const bytes = (...values: number[]) => Uint8Array.from(values);
const rule = (content: Uint8Array) => {
	try {
		decode(content);
		return 'accepted';
	} catch (error) {
		return error instanceof RefusedFile ? error.issues[0].rule : 'other';
	}
};

describe('decode', () => {
	it.each([
		['UTF-8', new TextEncoder().encode('λ,n\n'), 'λ,n\n'],
		['UTF-8 with a mark', bytes(0xef, 0xbb, 0xbf, 0x61), 'a'],
		['UTF-16 little-endian', bytes(0xff, 0xfe, 0x61, 0x00, 0xbb, 0x03), 'aλ'],
		['UTF-16 big-endian', bytes(0xfe, 0xff, 0x00, 0x61, 0x03, 0xbb), 'aλ'],
		['Latin-1', bytes(0xb5, 0x6d), 'µm'],
		['line ends of three kinds', new TextEncoder().encode('a\r\nb\rc\n'), 'a\nb\nc\n']
	])('reads %s', (_what, content, text) => {
		expect(decode(content)).toBe(text);
	});

	it.each([
		['gzip', bytes(0x1f, 0x8b, 8)],
		['zip', bytes(0x50, 0x4b, 3, 4)],
		['PDF', new TextEncoder().encode('%PDF-1.7')],
		['PNG', bytes(0x89, 0x50, 0x4e, 0x47)],
		['JPEG', bytes(0xff, 0xd8, 0xff, 0xe0)],
		['GIF', new TextEncoder().encode('GIF89a')],
		['text with a NUL', new TextEncoder().encode('1,2\0')],
		['text with an escape', new TextEncoder().encode('1,2\u001b[31m')]
	])('refuses %s without opening it', (_what, content) => {
		expect(rule(content)).toBe('binary');
	});

	it('refuses an empty file and one that is too large', () => {
		expect(rule(bytes())).toBe('empty');
		expect(rule(new Uint8Array(UPLOAD_BYTES_MAX + 1).fill(0x31))).toBe('size');
	});
});
