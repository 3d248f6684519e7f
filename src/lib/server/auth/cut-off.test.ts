import { describe, expect, it } from 'vitest';
import { endingWithAccess } from './cut-off.ts';

const source = (onCancel: () => void = () => undefined) => {
	let count = 0;
	return new ReadableStream<Uint8Array>({
		async pull(controller) {
			await new Promise((resolve) => setTimeout(resolve, 5));
			count += 1;
			if (count > 40) controller.close();
			else controller.enqueue(new Uint8Array([count]));
		},
		cancel: onCancel
	});
};

describe('endingWithAccess', () => {
	it('passes everything on while access lasts', async () => {
		const bytes = await new Response(endingWithAccess(source(), async () => true, 10)).arrayBuffer();
		expect(new Uint8Array(bytes)).toHaveLength(40);
	});

	it.each([
		['is lost', async () => false],
		['cannot be looked up', () => Promise.reject(new Error('the database is away'))]
	])('breaks off, and stops the work behind, when access %s', async (_why, stillIn) => {
		let stopped = false;
		const body = endingWithAccess(
			source(() => (stopped = true)),
			stillIn,
			10
		);
		await expect(new Response(body).arrayBuffer()).rejects.toThrow('Access ended');
		await new Promise((resolve) => setTimeout(resolve, 20));
		expect(stopped).toBe(true);
	});
});
