import {
	conducts,
	NO_STATIC_LIMIT,
	type ComplexValue,
	type StaticLimit,
	type Susceptibility
} from './susceptibility.ts';

/** eps - 1 of a mixture from eps - 1 of its parts, real and positive. */
type Rule = (host: number, inclusion: number) => number;

/** What a mixture makes of eps that grow without limit: of one part alone, or of both alike. */
interface Growth {
	/** Factor of the host's eps where the inclusion stays finite. */
	host: number;
	/** Factor of the inclusion's eps where the host stays finite. */
	inclusion: number;
	/** eps of the mixture where both are so large that their ones do not count. */
	both: Rule;
	/** Factor of the host's eps where the inclusion outgrows it and does not reach through; likewise inside a host. */
	around: number;
	inside: number;
	/** eps - 1 where the inclusion is without limit and the mixture finite. */
	aroundConductor: (host: number) => number;
	/** eps - 1 where the host is without limit and the mixture finite. */
	insideConductor: (inclusion: number) => number;
}

/**
 * Spheres of an inclusion, far apart, in a host (Maxwell Garnett 1904), at the volume fraction f:
 *
 *     (eps - eps_h)/(eps + 2 eps_h) = f (eps_i - eps_h)/(eps_i + 2 eps_h)
 *
 * written for eps - 1 as a quotient of positive terms. Spheres that conduct do not make the host conduct.
 */
export function maxwellGarnett(
	host: Susceptibility,
	inclusion: Susceptibility,
	fraction: number
): Susceptibility {
	if (fraction === 0) return host;
	if (fraction === 1) return inclusion;
	const rest = 1 - fraction;
	const rule: Rule = (h, i) => {
		const epsH = 1 + h;
		const epsI = 1 + i;
		return (rest * (2 * epsH + epsI) * h + 3 * fraction * epsH * i) / ((2 + fraction) * epsH + rest * epsI);
	};
	const growth: Growth = {
		host: (2 * rest) / (2 + fraction),
		inclusion: 0,
		both: (h, i) => (h * (2 * rest * h + (1 + 2 * fraction) * i)) / ((2 + fraction) * h + rest * i),
		around: (1 + 2 * fraction) / rest,
		inside: 0,
		aroundConductor: (h) => h + (3 * fraction * (1 + h)) / rest,
		insideConductor: () => 0
	};
	return mixed(host, inclusion, rule, growth, (h, i) => {
		const [eh, ei] = [shift(h), shift(i)];
		const top = plus(scale(2 * rest, eh), scale(1 + 2 * fraction, ei));
		const bottom = plus(scale(2 + fraction, eh), scale(rest, ei));
		return unshift(divide(multiply(eh, top), bottom));
	});
}

/**
 * Two phases on equal terms (Bruggeman 1935), the inclusion at the volume fraction f:
 *
 *     (1 - f) (eps_h - eps)/(eps_h + 2 eps) + f (eps_i - eps)/(eps_i + 2 eps) = 0
 *
 * whose positive root is written for eps - 1. A phase that conducts makes the mixture conduct from a third of the
 * volume on.
 */
export function bruggeman(host: Susceptibility, inclusion: Susceptibility, fraction: number): Susceptibility {
	if (fraction === 0) return host;
	if (fraction === 1) return inclusion;
	const [atHost, atInclusion] = [2 - 3 * fraction, 3 * fraction - 1];
	const rule: Rule = (h, i) => {
		const p = 3 - atHost * h - atInclusion * i;
		const c = 3 * ((1 - fraction) * h + fraction * i) + h * i;
		const root = Math.sqrt(p * p + 8 * c);
		return p >= 0 ? (2 * c) / (p + root) : (root - p) / 4;
	};
	const growth: Growth = {
		host: Math.max(0, atHost / 2),
		inclusion: Math.max(0, atInclusion / 2),
		both: (h, i) => {
			const b = atHost * h + atInclusion * i;
			const root = Math.sqrt(b * b + 8 * h * i);
			return b >= 0 ? (b + root) / 4 : (2 * h * i) / (root - b);
		},
		around: 1 / -atInclusion,
		inside: 1 / -atHost,
		aroundConductor: (h) => (h + 3 * fraction) / -atInclusion,
		insideConductor: (i) => (i + 3 * (1 - fraction)) / -atHost
	};
	return mixed(host, inclusion, rule, growth, (h, i) => {
		const [eh, ei] = [shift(h), shift(i)];
		const b = plus(scale(atHost, eh), scale(atInclusion, ei));
		const root = squareRoot(plus(multiply(b, b), scale(8, multiply(eh, ei))));
		const roots = [plus(b, root), plus(b, scale(-1, root))].map((one) => scale(1 / 4, one));
		// Of the two roots the passive one; both are where neither phase absorbs, and the positive one counts.
		return unshift(roots[0].im >= 0 && (roots[0].im > 0 || roots[0].re >= roots[1].re) ? roots[0] : roots[1]);
	});
}

function mixed(
	host: Susceptibility,
	inclusion: Susceptibility,
	rule: Rule,
	growth: Growth,
	real: (host: ComplexValue, inclusion: ComplexValue) => ComplexValue
): Susceptibility {
	const [hostReal, inclusionReal] = [host.atOmega, inclusion.atOmega];
	return {
		atXi: (xi) => rule(host.atXi(xi), inclusion.atXi(xi)),
		atOmega: hostReal && inclusionReal ? (omega) => real(hostReal(omega), inclusionReal(omega)) : null,
		atZero: staticLimit(host.atZero, inclusion.atZero, rule, growth),
		knots: [...new Set([...host.knots, ...inclusion.knots])].sort((a, b) => a - b),
		ulps: 3 * Math.max(host.ulps, inclusion.ulps) + 16
	};
}

/** Power of 1/xi with which eps grows. */
const orderOf = ({ slope, square }: StaticLimit): 0 | 1 | 2 => (square > 0 ? 2 : slope > 0 ? 1 : 0);

/** `finite` leaves the carriers of both parts out, as a material without carriers is asked for it. */
function staticLimit(host: StaticLimit, inclusion: StaticLimit, rule: Rule, growth: Growth): StaticLimit {
	const carriers = (h: number, i: number): number => {
		if (h > 0 && i > 0) return growth.both(h, i);
		return growth.host * h + growth.inclusion * i;
	};
	const orders = [orderOf(host), orderOf(inclusion)];
	const order = Math.max(...orders);
	const without = {
		...NO_STATIC_LIMIT,
		finite: rule(host.finite, inclusion.finite),
		plasmaSquared: carriers(host.plasmaSquared, inclusion.plasmaSquared)
	};
	if (order === 0) return without;
	const of = (limit: StaticLimit, own: number): number =>
		own < order ? 0 : order === 2 ? limit.square : limit.slope;
	const amplitude = carriers(of(host, orders[0]), of(inclusion, orders[1]));
	if (amplitude > 0)
		return order === 2 ? { ...without, square: amplitude } : { ...without, slope: amplitude };
	// The part that grows faster does not reach through: what conducts slower does.
	if (orders[0] === 1 && orders[1] === 2) return { ...without, slope: growth.around * host.slope };
	if (orders[0] === 2 && orders[1] === 1) return { ...without, slope: growth.inside * inclusion.slope };
	// Only one part conducts, and not through: it is met as a conductor without limit inside the other.
	const finite = conducts(inclusion)
		? growth.aroundConductor(host.finite)
		: growth.insideConductor(inclusion.finite);
	return { ...without, finite, plasmaSquared: 0 };
}

const shift = ({ re, im }: ComplexValue): ComplexValue => ({ re: 1 + re, im });
const unshift = ({ re, im }: ComplexValue): ComplexValue => ({ re: re - 1, im });
const scale = (factor: number, { re, im }: ComplexValue): ComplexValue => ({
	re: factor * re,
	im: factor * im
});
const plus = (a: ComplexValue, b: ComplexValue): ComplexValue => ({ re: a.re + b.re, im: a.im + b.im });
const multiply = (a: ComplexValue, b: ComplexValue): ComplexValue => ({
	re: a.re * b.re - a.im * b.im,
	im: a.re * b.im + a.im * b.re
});

function divide(a: ComplexValue, b: ComplexValue): ComplexValue {
	const norm = b.re * b.re + b.im * b.im;
	return { re: (a.re * b.re + a.im * b.im) / norm, im: (a.im * b.re - a.re * b.im) / norm };
}

function squareRoot({ re, im }: ComplexValue): ComplexValue {
	const size = Math.hypot(re, im);
	if (size === 0) return { re: 0, im: 0 };
	const larger = Math.sqrt((size + Math.abs(re)) / 2);
	const smaller = Math.abs(im) / (2 * larger);
	const side = im < 0 ? -1 : 1;
	return re >= 0 ? { re: larger, im: side * smaller } : { re: smaller, im: side * larger };
}
