import { gaussRule } from '../numerics/gauss-rule.ts';
import { segmentAt, type Segment } from './segments.ts';

const RULE = gaussRule(16, Infinity);

/** Panels no longer than this in ln omega. */
const WIDEST_PANEL = 0.35;

/**
 * A law continued beyond its panel is subtracted only while it stays of the size that it has there: beside a band edge
 * eps'' grows like omega^100, and that law continued by a third would be 1e12 times too large.
 */
const FARTHEST_CONTINUATION = 1;

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
		const widest =
			segment.kind === 'power' ? Math.min(WIDEST_PANEL, 2 / Math.abs(segment.growth)) : WIDEST_PANEL;
		const panels = Math.max(1, Math.ceil(Math.log(to / from) / widest));
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
	const outside = Math.log(Math.max(a / omega, omega / b, 1));
	const near =
		outside < Math.log(1.5) &&
		(segment.kind === 'linear' || outside * Math.abs(segment.growth) < FARTHEST_CONTINUATION);
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
