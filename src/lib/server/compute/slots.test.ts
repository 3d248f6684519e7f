import { describe, expect, it } from 'vitest';
import { Slots } from './slots.ts';

const never = new AbortController().signal;

describe('Slots', () => {
	it('lets in as many as there are places, the others in their order', async () => {
		const slots = new Slots(2, 10);
		const entered: string[] = [];
		const enter = async (name: string) => {
			const leave = await slots.take(never);
			entered.push(name);
			return leave;
		};
		const a = await enter('a');
		await enter('b');
		const c = enter('c');
		const d = enter('d');
		await Promise.resolve();
		expect(entered).toEqual(['a', 'b']);
		expect(slots.waiting).toBe(2);
		a?.();
		(await c)?.();
		await d;
		expect(entered).toEqual(['a', 'b', 'c', 'd']);
	});

	it('turns away whoever finds the queue full', async () => {
		const slots = new Slots(1, 1);
		await slots.take(never);
		const second = slots.take(never);
		expect(await slots.take(never)).toBeUndefined();
		expect(slots.waiting).toBe(1);
		expect(await Promise.race([second, Promise.resolve('still waiting')])).toBe('still waiting');
	});

	it('forgets who was called off while waiting and gives the place to the next', async () => {
		const slots = new Slots(1, 10);
		const leave = await slots.take(never);
		const impatient = new AbortController();
		const second = slots.take(impatient.signal);
		const third = slots.take(never);
		impatient.abort(new Error('gone'));
		await expect(second).rejects.toThrow('gone');
		leave?.();
		expect(await third).toBeTypeOf('function');
	});
});
