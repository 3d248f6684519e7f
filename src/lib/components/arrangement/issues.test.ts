import { describe, expect, it } from 'vitest';
import { messagesAt, otherMessages, slotPath, thicknessPath } from './issues.ts';

const issues = [
	{ path: 'arrangement.left.layers[0].thicknessNm', message: 'too thin' },
	{ path: 'arrangement.left.layers.0.of.zeroFrequency', message: 'does not conduct' },
	{ path: 'arrangement.left.layers.10.of', message: 'other layer' },
	{ path: 'separationsNm', message: 'too many' }
];

describe('complaints beside their fields', () => {
	it('are found with brackets or dots, and not at a neighbour whose number begins alike', () => {
		expect(messagesAt(issues, thicknessPath('left1'))).toEqual(['too thin']);
		expect(messagesAt(issues, slotPath('left1'))).toEqual(['does not conduct']);
		expect(messagesAt(issues, slotPath('left'))).toEqual([]);
	});

	it('that belong to no field are told apart', () => {
		expect(otherMessages(issues)).toEqual(['too many']);
	});

	it.each([
		['medium', 'arrangement.medium'],
		['right', 'arrangement.right.substrate'],
		['right3', 'arrangement.right.layers.2.of']
	])('place %s is %s', (slot, path) => {
		expect(slotPath(slot)).toBe(path);
	});
});
