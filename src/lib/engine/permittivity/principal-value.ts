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

/** Panels of all segments, and at the nodes of each omega' and omega' eps''(omega'): none of it depends on omega. */
interface Panels {
	segment: Segment[];
	from: number[];
	to: number[];
	x: Float64Array;
	moment: Float64Array;
}

function panelsOf(segments: readonly Segment[]): Panels {
	const [segment, starts, ends]: [Segment[], number[], number[]] = [[], [], []];
	for (const one of segments) {
		const { from, to } = one;
		const widest = one.kind === 'power' ? Math.min(WIDEST_PANEL, 2 / Math.abs(one.growth)) : WIDEST_PANEL;
		const panels = Math.max(1, Math.ceil(Math.log(to / from) / widest));
		const ratio = Math.pow(to / from, 1 / panels);
		for (let j = 0; j < panels; j++) {
			segment.push(one);
			starts.push(j === 0 ? from : from * Math.pow(ratio, j));
			ends.push(j === panels - 1 ? to : from * Math.pow(ratio, j + 1));
		}
	}
	const nodes = RULE.nodes.length;
	const x = new Float64Array(segment.length * nodes);
	const moment = new Float64Array(segment.length * nodes);
	for (let p = 0; p < segment.length; p++) {
		const [a, b] = [starts[p], ends[p]];
		for (let i = 0; i < nodes; i++) {
			const at = p * nodes + i;
			x[at] = (a + b) / 2 + ((b - a) / 2) * RULE.nodes[i];
			moment[at] = x[at] * segmentAt(segment[p], x[at]);
		}
	}
	return { segment, from: starts, to: ends, x, moment };
}

/**
 * `(2/pi) P int omega' eps''(omega')/(omega'^2 - omega^2) d omega'` over segments: eps'(omega) - 1.
 * On each segment its own law, continued to omega, is subtracted so that the integrand stays smooth, and added back as
 * a logarithm; where two segments join without a step their logarithms cancel (methods.md section 7, check 2).
 *
 * @returns (omega) in rad/s, > 0; powers are taken once, not once an omega
 */
export function principalValue(segments: readonly Segment[]): (omega: number) => number {
	const panels = panelsOf(segments);
	return (omega) => {
		let total = 0;
		for (let p = 0; p < panels.segment.length; p++) total += panelValue(panels, p, omega);
		return (2 / Math.PI) * total;
	};
}

function panelValue({ segment, from, to, x, moment }: Panels, p: number, omega: number): number {
	const [a, b] = [from[p], to[p]];
	const { kind, growth } = segment[p];
	const nodes = RULE.nodes.length;
	const outside = Math.log(Math.max(a / omega, omega / b, 1));
	const near =
		outside < Math.log(1.5) && (kind === 'linear' || outside * Math.abs(growth) < FARTHEST_CONTINUATION);
	const w =
		near && (Math.abs(omega / a - 1) < OFF_KNOT || Math.abs(omega / b - 1) < OFF_KNOT)
			? omega * (1 + 2 * OFF_KNOT)
			: omega;
	const subtracted = near ? segmentAt(segment[p], w) * w : 0;
	let sum = 0;
	for (let i = 0, at = p * nodes; i < nodes; i++, at++) {
		if (x[at] === w) continue;
		sum += (RULE.weights[i] * (moment[at] - subtracted)) / ((x[at] - w) * (x[at] + w));
	}
	const logarithm = near
		? (subtracted / (2 * w)) * Math.log(Math.abs(((b - w) * (a + w)) / ((b + w) * (a - w))))
		: 0;
	return sum * (b - a) + logarithm;
}
