import type { HighEnd, LowEnd } from '$lib/engine/contract.ts';
import { gaussLegendre } from './slow-lifshitz-quadrature.ts';

/**
 * Kramers-Kronig integral of a tabulated eps'' (log-log linear, linear beside a zero), all in eV:
 * chi(i xi) = (2/pi) int omega eps''(omega)/(omega^2 + xi^2) d omega.
 *
 * Power segments are summed as the series of the hypergeometric closed form: in (omega/xi)^2 well below xi, in
 * (xi/omega)^2 well above, and by quadrature in ln omega only in the octave around xi, where the nearest singularity
 * lies at distance pi/2.
 */

/** Series are used where the ratio of frequencies is below this: 0.49 per term, no cancellation. */
const SERIES_RATIO = 0.7;
const SERIES_TERMS = 70;
const around = gaussLegendre(24);

/** int_0^length e^(rate t) dt without loss where rate * length is small. */
function exponentialMoment(rate: number, length: number): number {
	return rate === 0 ? length : Math.expm1(rate * length) / rate;
}

/** ln(to/from), exact to the last digit also where the two are close. */
function logRatio(from: number, to: number): number {
	return Math.log1p((to - from) / from);
}

/** int_from^to omega (value (omega/from)^power)/(omega^2 + xi^2) d omega on a segment on one side of xi or around it. */
function powerPiece(value: number, power: number, from: number, to: number, xi: number): number {
	const length = logRatio(from, to);
	if (to <= SERIES_RATIO * xi) {
		let sum = 0;
		const ratio = (from / xi) ** 2;
		let factor = ratio;
		for (let j = 0; j < SERIES_TERMS; j++) {
			// the moment grows like (to/from)^2j, so that the terms fall like (to/xi)^2j
			const term = factor * exponentialMoment(power + 2 + 2 * j, length);
			sum += j % 2 === 0 ? term : -term;
			if (term < 1e-19 * sum) break;
			factor *= ratio;
		}
		return value * sum;
	}
	if (from >= xi / SERIES_RATIO) {
		let sum = 0;
		const ratio = (xi / from) ** 2;
		let factor = 1;
		for (let j = 0; j < SERIES_TERMS; j++) {
			const term = factor * exponentialMoment(power - 2 * j, length);
			sum += j % 2 === 0 ? term : -term;
			if (term < 1e-19 * sum) break;
			factor *= ratio;
		}
		return value * sum;
	}
	let sum = 0;
	for (let i = 0; i < around.nodes.length; i++) {
		const t = (length / 2) * (1 + around.nodes[i]);
		const omega = from * Math.exp(t);
		sum += (around.weights[i] * Math.exp(power * t) * omega * omega) / (omega * omega + xi * xi);
	}
	return value * sum * (length / 2);
}

/** Longest piece in ln omega: keeps every exponential far from overflow. */
const LONGEST_PIECE = 0.7;

function powerSegment(value: number, power: number, from: number, to: number, xi: number): number {
	const marks = [from, SERIES_RATIO * xi, xi, xi / SERIES_RATIO, to].filter((w) => w >= from && w <= to);
	let sum = 0;
	for (let i = 1; i < marks.length; i++) {
		const pieces = Math.max(1, Math.ceil(Math.log(marks[i] / marks[i - 1]) / LONGEST_PIECE));
		for (let p = 0; p < pieces; p++) {
			const a = marks[i - 1] * (marks[i] / marks[i - 1]) ** (p / pieces);
			const b = p === pieces - 1 ? marks[i] : marks[i - 1] * (marks[i] / marks[i - 1]) ** ((p + 1) / pieces);
			if (b > a) sum += powerPiece(value * (a / from) ** power, power, a, b, xi);
		}
	}
	return sum;
}

/** int_from^to omega (straight line)/(omega^2 + xi^2) d omega; `from` is positive. */
function linearSegment(startValue: number, endValue: number, from: number, to: number, xi: number): number {
	const pieces = Math.max(1, Math.ceil(Math.log(to / from) / 0.35));
	let sum = 0;
	for (let p = 0; p < pieces; p++) {
		const a = from * (to / from) ** (p / pieces);
		const length = Math.log(to / from) / pieces;
		for (let i = 0; i < around.nodes.length; i++) {
			const omega = a * Math.exp((length / 2) * (1 + around.nodes[i]));
			const line = (startValue * (to - omega) + endValue * (omega - from)) / (to - from);
			sum += (around.weights[i] * (length / 2) * line * omega * omega) / (omega * omega + xi * xi);
		}
	}
	return sum;
}

/** eps'' proportional to omega^exponent from zero to `to`. */
function lowPower(value: number, exponent: number, to: number, xi: number): number {
	if (value === 0) return 0;
	if (xi === 0) return value / exponent;
	const edge = Math.min(to, SERIES_RATIO * xi);
	let sum = 0;
	let factor = (edge / xi) ** 2;
	for (let j = 0; j < SERIES_TERMS; j++) {
		sum += ((j % 2 === 0 ? 1 : -1) * factor) / (exponent + 2 + 2 * j);
		factor *= (edge / xi) ** 2;
	}
	const atEdge = value * (edge / to) ** exponent;
	return atEdge * sum + (edge < to ? powerSegment(atEdge, exponent, edge, to, xi) : 0);
}

/** eps'' proportional to omega^-exponent from `from` to infinity. */
function highPower(value: number, exponent: number, from: number, xi: number): number {
	if (value === 0) return 0;
	const edge = Math.max(from, xi / SERIES_RATIO);
	let sum = 0;
	let factor = 1;
	for (let j = 0; j < SERIES_TERMS; j++) {
		sum += ((j % 2 === 0 ? 1 : -1) * factor) / (exponent + 2 * j);
		factor *= (xi / edge) ** 2;
	}
	const atEdge = value * (edge / from) ** -exponent;
	return atEdge * sum + (edge > from ? powerSegment(value, -exponent, from, edge, xi) : 0);
}

/** wp^2 gamma int_0^to d omega/((omega^2 + gamma^2)(omega^2 + xi^2)), the eps'' of Drude cut off at `to`. */
function lowDrude(plasma: number, damping: number, to: number, xi: number): number {
	if (damping === 0) return 0;
	const closed = (s: number) => Math.atan(to / s) / s;
	if (Math.abs(xi / damping - 1) > 0.3)
		return (plasma * plasma * damping * (closed(damping) - closed(xi))) / ((xi - damping) * (xi + damping));
	// omega = gamma tan(angle); smooth where xi is near gamma
	const end = Math.atan(to / damping);
	let sum = 0;
	for (let i = 0; i < around.nodes.length; i++) {
		const angle = (end / 2) * (1 + around.nodes[i]);
		const [sine, cosine] = [Math.sin(angle), Math.cos(angle)];
		sum += (around.weights[i] * cosine ** 2) / ((damping * sine) ** 2 + (xi * cosine) ** 2);
	}
	return plasma * plasma * sum * (end / 2);
}

/** chi(i xi) of a table, xi in eV; for xi = 0 the low end must not conduct. */
export function tableSusceptibility(
	energies: readonly number[],
	epsilon2: readonly number[],
	lowEnd: LowEnd,
	highEnd: HighEnd,
	xi: number
): number {
	const last = energies.length - 1;
	let sum = 0;
	for (let i = 0; i < last; i++) {
		const [a, b] = [energies[i], energies[i + 1]];
		const [start, end] = [epsilon2[i], epsilon2[i + 1]];
		if (start > 0 && end > 0) {
			const power = (end > start ? logRatio(start, end) : -logRatio(end, start)) / logRatio(a, b);
			sum += powerSegment(start, power, a, b, xi);
		} else if (start > 0 || end > 0) sum += linearSegment(start, end, a, b, xi);
	}
	if (lowEnd.kind === 'drude') sum += lowDrude(lowEnd.plasmaEnergyEv, lowEnd.dampingEv, energies[0], xi);
	if (lowEnd.kind === 'power') sum += lowPower(epsilon2[0], lowEnd.exponent, energies[0], xi);
	if (highEnd.kind === 'power') sum += highPower(epsilon2[last], highEnd.exponent, energies[last], xi);
	const sharp = lowEnd.kind === 'plasma' ? (lowEnd.plasmaEnergyEv / xi) ** 2 : 0;
	return (2 / Math.PI) * sum + sharp;
}
