/** Which field of the page a complaint of the engine belongs to. */

export interface Issue {
	path: string;
	message: string;
}

/** Path of a place inside the request, in dots: `arrangement.left.layers.0.of`. */
export function slotPath(slot: string): string {
	if (slot === 'medium') return 'arrangement.medium';
	const side = slot.startsWith('left') ? 'left' : 'right';
	const layer = Number(slot.slice(side.length));
	return layer === 0 ? `arrangement.${side}.substrate` : `arrangement.${side}.layers.${layer - 1}.of`;
}

export function thicknessPath(slot: string): string {
	return slotPath(slot).replace(/\.of$/, '.thicknessNm');
}

const dotted = (path: string) => path.replace(/\[(\d+)\]/g, '.$1');

/** What is said about a field or anything inside it, each sentence once. */
export function messagesAt(issues: readonly Issue[], path: string): string[] {
	const own = issues.filter(({ path: at }) => dotted(at) === path || dotted(at).startsWith(`${path}.`));
	return [...new Set(own.map(({ message }) => message))];
}

const FIELDS = [
	'left',
	'medium',
	'right',
	'shape',
	'temperatureK',
	'debyeLengthNm',
	'salt',
	'ions',
	'roughness'
].map((name) => `arrangement.${name}`);

/** What belongs to no field of the page and is said once for the whole choice. */
export function otherMessages(issues: readonly Issue[]): string[] {
	const rest = issues.filter(
		({ path }) => !FIELDS.some((field) => dotted(path) === field || dotted(path).startsWith(`${field}.`))
	);
	return [...new Set(rest.map(({ message }) => message))];
}
