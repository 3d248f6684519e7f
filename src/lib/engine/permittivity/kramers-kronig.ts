import { gaussRule } from '../numerics/gauss-rule.ts';
import { segmentAt, type Segment } from './segments.ts';

/** How far one panel may stretch in ln omega, and how steep a power it may hold, for 1e-15 with the nodes below. */
const WIDEST_PANEL = Math.LN2;
const STEEPEST_PANEL = 3;

/** Nodes that a panel needs: the integrand is analytic for |Im ln omega| < pi/2, so Gauss errors fall like rho^-2m. */
function nodesFor(length: number, steepness: number): number {
	const b = Math.PI / length;
	const forWidth = 36 / (2 * Math.log(b + Math.sqrt(1 + b * b)));
	return Math.min(12, Math.ceil(forWidth + 2 * steepness) + 1);
}

/**
 * `eps(i xi) - 1 = (2/pi) int omega eps''/(omega^2 + xi^2) d omega` over segments of an interpolated table, as a sum
 * of `strength/(omega^2 + xi^2)` over Gauss-Legendre nodes in ln omega. All terms are positive, so relative accuracy
 * is kept at every xi (methods.md section 7, "Tables").
 *
 * @returns (xi) => contribution, xi in rad/s, >= 0
 */
export function kramersKronig(segments: readonly Segment[]): (xi: number) => number {
	const squares: number[] = [];
	const strengths: number[] = [];
	for (const segment of segments) {
		const length = Math.log(segment.to / segment.from);
		const steepness = segment.kind === 'power' ? Math.abs(segment.growth + 2) * length : 2 * length;
		const panels = Math.max(1, Math.ceil(length / WIDEST_PANEL), Math.ceil(steepness / STEEPEST_PANEL));
		const rule = gaussRuleOf(nodesFor(length / panels, steepness / panels));
		const half = length / panels / 2;
		for (let j = 0; j < panels; j++) {
			for (let i = 0; i < rule.nodes.length; i++) {
				const omega = segment.from * Math.exp(half * (2 * j + 1 + rule.nodes[i]));
				squares.push(omega * omega);
				strengths.push(
					(2 / Math.PI) * 2 * half * rule.weights[i] * omega * omega * segmentAt(segment, omega)
				);
			}
		}
	}
	const w2 = Float64Array.from(squares);
	const f = Float64Array.from(strengths);
	return (xi) => {
		const xi2 = xi * xi;
		let sum = 0;
		for (let i = 0; i < f.length; i++) sum += f[i] / (w2[i] + xi2);
		return sum;
	};
}

const rules = new Map<number, ReturnType<typeof gaussRule>>();

function gaussRuleOf(count: number): ReturnType<typeof gaussRule> {
	const known = rules.get(count) ?? gaussRule(count, Infinity);
	rules.set(count, known);
	return known;
}
