import type { HighEnd, LowEnd } from '../contract.ts';
import { powerIntegral } from '../numerics/power-integral.ts';
import { radPerSFromEv } from '../units.ts';
import { NO_STATIC_LIMIT, type StaticLimit } from './susceptibility.ts';

/** What lies outside a table: its share of eps(i xi) - 1, its eps'', and what it does to the static limit. */
export interface TableEnd {
	atXi(xi: number): number;
	/** eps'' inside the reach of this end. */
	epsIm(omega: number): number;
	atZero: StaticLimit;
}

const NOTHING: TableEnd = { atXi: () => 0, epsIm: () => 0, atZero: NO_STATIC_LIMIT };

/** int_0^w1 of the Drude eps'', written so that nothing cancels, at xi = gamma either (methods.md section 7). */
function drudeBelow(wp2: number, gamma: number, w1: number): (xi: number) => number {
	const ownAngle = Math.atan(w1 / gamma);
	return (xi) => {
		const delta = xi - gamma;
		const slope = w1 / (gamma * xi + w1 * w1);
		const rest = delta === 0 ? slope : Math.atan(slope * delta) / delta;
		return ((2 / Math.PI) * wp2 * (ownAngle + gamma * rest)) / (xi * (xi + gamma));
	};
}

/**
 * Below the table. `drude`: the Drude eps'' from zero to the first point; `plasma`: no eps'' but wp^2/xi^2; `power`:
 * eps'' proportional to omega^exponent, joined at the first point.
 *
 * @param firstOmega     rad/s
 * @param firstEpsilon2  eps'' at the first point
 */
export function lowEnd(end: LowEnd, firstOmega: number, firstEpsilon2: number): TableEnd {
	if (end.kind === 'none' || (end.kind === 'power' && firstEpsilon2 === 0)) return NOTHING;
	if (end.kind === 'power') {
		const { exponent } = end;
		const scale = (2 / Math.PI) * firstEpsilon2;
		return {
			atXi: (xi) => {
				const rho = xi / firstOmega;
				return (scale * powerIntegral(exponent + 2, 1 / rho)) / (rho * rho);
			},
			epsIm: (omega) => firstEpsilon2 * Math.pow(omega / firstOmega, exponent),
			atZero: { ...NO_STATIC_LIMIT, finite: scale / exponent }
		};
	}
	const wp2 = radPerSFromEv(end.plasmaEnergyEv) ** 2;
	const gamma = end.kind === 'drude' ? radPerSFromEv(end.dampingEv) : 0;
	if (gamma === 0) {
		return {
			atXi: (xi) => wp2 / (xi * xi),
			epsIm: () => 0,
			atZero: { ...NO_STATIC_LIMIT, square: wp2, plasmaSquared: wp2 }
		};
	}
	return {
		atXi: drudeBelow(wp2, gamma, firstOmega),
		epsIm: (omega) => (wp2 * gamma) / (omega * (omega * omega + gamma * gamma)),
		atZero: {
			finite: 0,
			slope: wp2 / gamma,
			square: 0,
			plasmaSquared: wp2
		}
	};
}

/** Above the table: eps'' proportional to omega^-exponent, joined at the last point. */
export function highEnd(end: HighEnd, lastOmega: number, lastEpsilon2: number): TableEnd {
	if (end.kind === 'none' || lastEpsilon2 === 0) return NOTHING;
	const { exponent } = end;
	const scale = (2 / Math.PI) * lastEpsilon2;
	return {
		atXi: (xi) => scale * powerIntegral(exponent, xi / lastOmega),
		epsIm: (omega) => lastEpsilon2 * Math.pow(omega / lastOmega, -exponent),
		atZero: { ...NO_STATIC_LIMIT, finite: scale / exponent }
	};
}
