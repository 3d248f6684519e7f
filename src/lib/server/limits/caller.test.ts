import { describe, expect, it } from 'vitest';
import { callerOf } from './caller.ts';

describe('callerOf', () => {
	it.each([
		['203.0.113.7', '203.0.113.7'],
		['::ffff:203.0.113.7', '203.0.113.7'],
		['::1', '0:0:0:0::/64'],
		['2001:db8:1:2:3:4:5:6', '2001:db8:1:2::/64'],
		['2001:0DB8:0001:0002::9', '2001:db8:1:2::/64'],
		['2001:db8::1', '2001:db8:0:0::/64'],
		['fe80::1%eth0', 'fe80:0:0:0::/64']
	])('takes %s as %s', (address, caller) => {
		expect(callerOf(address)).toBe(caller);
	});
});
