import { describe, expect, it } from 'vitest';
import { blobOfDataAddress } from './data-address.ts';

describe('blobOfDataAddress', () => {
	it('reads percent-encoded text', async () => {
		const blob = blobOfDataAddress(`data:image/svg+xml,${encodeURIComponent('<svg>ε, ω</svg>')}`);
		expect(blob.type).toBe('image/svg+xml');
		expect(await blob.text()).toBe('<svg>ε, ω</svg>');
	});

	it('reads base64 byte for byte', async () => {
		const blob = blobOfDataAddress(`data:image/png;base64,${btoa('\u0089PNG\u0000\u00ff')}`);
		expect([...new Uint8Array(await blob.arrayBuffer())]).toEqual([0x89, 0x50, 0x4e, 0x47, 0, 0xff]);
	});

	it('refuses anything else', () => {
		expect(() => blobOfDataAddress('https://example.com/,x')).toThrow(RangeError);
	});
});
