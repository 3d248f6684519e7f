import { gaussRule } from '../numerics/gauss-rule.ts';
import { segmentAt, type Segment } from './segments.ts';

const RULE = gaussRule(16, Infinity);

/** Panels no longer than this in ln omega. */
const WIDEST_PANEL = 0.35;

/** omega is moved off a knot by this relative amount: the logarithms of both neighbours would be infinite there. */
const OFF_KNOT = 1e-9;

/**
 * `(2/pi) P int omega' eps''(omega')/(omega'^2 - omega^2) d omega'` over segments: eps'(omega) - 1.
 * On each segment its own law, continued to omega, is subtracted so that the integrand stays smooth, and added back as
 * a logarithm; where two segments join without a step their logarithms cancel (methods.md section 7, check 2).
 *
 * @param omega  rad/s, > 0
 */
export function principalValue(segments: readonly Segment[], omega: number): number {
	let total = 0;
	for (const segment of segments) {
		const { from, to } = segment;
		const panels = Math.max(1, Math.ceil(Math.log(to / from) / WIDEST_PANEL));
		const ratio = Math.pow(to / from, 1 / panels);
		for (let j = 0; j < panels; j++) {
			const a = j === 0 ? from : from * Math.pow(ratio, j);
			const b = j === panels - 1 ? to : from * Math.pow(ratio, j + 1);
			total += panelValue(segment, a, b, omega);
		}
	}
	return (2 / Math.PI) * total;
}

function panelValue(segment: Segment, a: number, b: number, omega: number): number {
	const near = omega > a / 1.5 && omega < b * 1.5;
	const w =
		near && (Math.abs(omega / a - 1) < OFF_KNOT || Math.abs(omega / b - 1) < OFF_KNOT)
			? omega * (1 + 2 * OFF_KNOT)
			: omega;
	const subtracted = near ? segmentAt(segment, w) * w : 0;
	let sum = 0;
	for (let i = 0; i < RULE.nodes.length; i++) {
		const x = (a + b) / 2 + ((b - a) / 2) * RULE.nodes[i];
		if (x === w) continue;
		sum += (RULE.weights[i] * (x * segmentAt(segment, x) - subtracted)) / ((x - w) * (x + w));
	}
	const logarithm = near
		? (subtracted / (2 * w)) * Math.log(Math.abs(((b - w) * (a + w)) / ((b + w) * (a - w))))
		: 0;
	return sum * (b - a) + logarithm;
}
