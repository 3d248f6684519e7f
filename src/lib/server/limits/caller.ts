import { isIPv6 } from 'node:net';

const MAPPED_IPV4 = /^::ffff:(\d+\.\d+\.\d+\.\d+)$/i;
/** A household or a laboratory is given a network of this many 16-bit groups; within it addresses are free to choose. */
const NETWORK_GROUPS = 4;

/** Who counts as one caller: an IPv4 address, or the network that an IPv6 address belongs to. */
export function callerOf(address: string): string {
	const mapped = MAPPED_IPV4.exec(address);
	if (mapped) return mapped[1];
	if (!isIPv6(address)) return address;
	const [head, tail] = address.split('%')[0].toLowerCase().split('::');
	const groups = head ? head.split(':') : [];
	if (tail !== undefined) {
		const rest = tail ? tail.split(':') : [];
		groups.push(...new Array<string>(Math.max(0, 8 - groups.length - rest.length)).fill('0'), ...rest);
	}
	const network = groups.slice(0, NETWORK_GROUPS).map((group) => Number.parseInt(group, 16).toString(16));
	return `${network.join(':')}::/64`;
}
