import { OPAQUE } from '../reflection/stack.ts';
import type { ZeroFrequencyMaterial } from '../reflection/zero-frequency.ts';
import type { BodyAtFrequency } from './body-response.ts';
import { dressedResponse, respondDressed, type DressedResponse } from './dressed-response.ts';
import { setAdmittances, setWhole } from './stack-response.ts';

/** What a body has beyond isotropic places, index 0 the medium. */
export interface DressAtFrequency {
	/** eps - 1 along the normal. */
	normal: Float64Array;
	uniaxial: (place: number) => boolean;
	/** sigma/(eps_0 c) of the sheet in front of each place. */
	sheet: Float64Array;
}

export interface DressedBodyResponse {
	tm: DressedResponse;
	te: DressedResponse;
}

export const dressedBodyResponse = (): DressedBodyResponse => ({
	tm: dressedResponse(),
	te: dressedResponse()
});

const tmKappas = new Float64Array(64);
const teKappas = new Float64Array(64);

/**
 * A dressed body at xi > 0 (reflection/dressed-stack.ts), K = (2 d k)^2 and X = (2 d xi/c)^2; derivatives are those at fixed
 * wave number k. With p in the plane and z along the normal, Y_TM = p/kappa_TM and Y_TE = kappa_TE/mu:
 *
 *     kappa_TM^2 = p (K/z + mu X):  d ln Y_TM/dp = 1/(2 p),     d ln Y_TM/dz = p K/(2 z^2 kappa_TM^2),
 *                                   d kappa/dp = kappa/(2 p),   d kappa/dz = -p K/(2 z^2 kappa)
 *     kappa_TE^2 = K + p mu X:      d ln Y_TE/dp = mu X/(2 kappa_TE^2)
 */
export function respondDressedAtFrequency(
	into: DressedBodyResponse,
	{ chi, mu, thickness, ideal }: BodyAtFrequency,
	{ normal, uniaxial, sheet }: DressAtFrequency,
	K: number,
	X: number
): void {
	const { tm, te } = into;
	const places = chi.length - 1;
	const root = Math.sqrt(X);
	const setPlace = (j: number): void => {
		const [p, z] = [1 + chi[j], 1 + normal[j]];
		const [magnetic, electric] = [K + p * mu[j] * X, (p / z) * K + p * mu[j] * X];
		teKappas[j] = Math.sqrt(magnetic);
		tmKappas[j] = Math.sqrt(electric);
		tm.admittance[j] = 1 / (2 * p);
		tm.admittanceByNormal[j] = (p * K) / (2 * z * z * electric);
		te.admittance[j] = (mu[j] * X) / (2 * magnetic);
		te.admittanceByNormal[j] = 0;
		tm.depth[j] = tmKappas[j] * thickness[j];
		te.depth[j] = teKappas[j] * thickness[j];
		tm.deeper[j] = tm.depth[j] * tm.admittance[j];
		tm.deeperByNormal[j] = -tm.depth[j] * tm.admittanceByNormal[j];
		te.deeper[j] = te.depth[j] * te.admittance[j];
		te.deeperByNormal[j] = 0;
	};
	setPlace(0);
	let last = 0;
	let depth = 0;
	while (last < places && depth < OPAQUE) {
		const b = ++last;
		const a = b - 1;
		tm.cover[b] = 0;
		te.cover[b] = 0;
		if (ideal && b === places) {
			for (const one of [tm, te]) {
				one.admittance[b] = 0;
				one.admittanceByNormal[b] = 0;
			}
			setWhole(tm, b, 1);
			setWhole(te, b, -1);
			break;
		}
		setPlace(b);
		const [epsA, epsB, zA, zB] = [1 + chi[a], 1 + chi[b], 1 + normal[a], 1 + normal[b]];
		const dEps = chi[b] - chi[a];
		const dMu = mu[b] - mu[a];
		const [tmOnward, tmBack] = [epsB * tmKappas[a], epsA * tmKappas[b]];
		const [teOnward, teBack] = [mu[b] * teKappas[a], mu[a] * teKappas[b]];
		const uneven = ((epsB * (normal[b] - normal[a]) + zA * dEps) * K) / (zA * zB);
		const tmDifference = epsA * epsB * (uneven + (dEps * mu[a] - epsA * dMu) * X);
		const teDifference = dMu * (mu[a] + mu[b]) * K + mu[a] * mu[b] * X * (dMu * epsA - mu[a] * dEps);
		setAdmittances(tm, b, tmDifference / (tmOnward + tmBack), tmOnward, tmBack);
		setAdmittances(te, b, teDifference / (teOnward + teBack), teOnward, teBack);
		tm.cover[b] = (sheet[b] * tmKappas[a]) / (root * epsA);
		te.cover[b] = (sheet[b] * root * mu[a]) / teKappas[a];
		if (b < places) depth += Math.min(tm.depth[b], te.depth[b]);
	}
	tm.last = last;
	te.last = last;
	respondDressed(tm, 'tm', uniaxial);
	respondDressed(te, 'te', uniaxial);
}

/**
 * TM of a dressed body at n = 0 (dress.ts): sqrt(p z) takes the part of eps and fields fall like sqrt(p/z) k; conductors and
 * sheets reflect wholly, whatever their permittivities.
 *
 * @param y         2 d kappa of the gap: above 2 d k where ions screen
 * @param screened  the first interface is that of a medium with mobile ions
 */
export function respondDressedAtZero(
	into: DressedResponse,
	materials: readonly ZeroFrequencyMaterial[],
	thickness: Float64Array,
	uniaxial: (place: number) => boolean,
	y: number,
	k: number,
	screened: boolean
): void {
	const end = materials.findIndex(({ ideal }) => ideal);
	into.last = end < 0 ? materials.length - 1 : end;
	for (let j = 0; j <= into.last; j++) {
		const { amplitude, stretch = 1, order, ideal } = materials[j];
		const constant = order === 0 && !ideal;
		const eps = 1 + amplitude;
		into.cover[j] = 0;
		into.depth[j] = j > 0 && j < into.last ? k * stretch * thickness[j] : 0;
		into.admittance[j] = constant ? 1 / (2 * eps * stretch) : 0;
		into.admittanceByNormal[j] = constant ? stretch / (2 * eps) : 0;
		into.deeper[j] = into.depth[j] * into.admittance[j];
		into.deeperByNormal[j] = -into.depth[j] * into.admittanceByNormal[j];
	}
	for (let b = 1; b <= into.last; b++) {
		const [before, behind] = [materials[b - 1], materials[b]];
		if (behind.ideal || behind.sheet || behind.order > before.order) setWhole(into, b, 1);
		else if (behind.order < before.order) setWhole(into, b, -1);
		else {
			const one = before.order === 0 ? 1 : 0;
			const first = screened && b === 1;
			const onward = (one + behind.amplitude) * (first ? k : 1);
			const back = (one + before.amplitude) * (first ? y : 1);
			setAdmittances(into, b, first ? onward - back : behind.amplitude - before.amplitude, onward, back);
		}
	}
	respondDressed(into, 'tm', uniaxial);
}

const isotropic = (): boolean => false;

/**
 * TE of a body at n = 0 where carriers without damping take part: kappa^2 = K + w mu X, X = (2 d/c)^2, w the square of a
 * plasma frequency (methods.md section 2). Derivatives are those to ln w of each place.
 */
export function respondPlasmaAtZero(
	into: DressedResponse,
	materials: readonly ZeroFrequencyMaterial[],
	thickness: Float64Array,
	y: number,
	X: number
): void {
	const end = materials.findIndex(({ ideal }) => ideal);
	into.last = end < 0 ? materials.length - 1 : end;
	for (let j = 0; j <= into.last; j++) {
		const carriers = materials[j].square * materials[j].mu * X;
		const square = y * y + carriers;
		teKappas[j] = Math.sqrt(square);
		into.cover[j] = 0;
		into.depth[j] = j > 0 && j < into.last ? teKappas[j] * thickness[j] : 0;
		into.admittance[j] = materials[j].ideal ? 0 : carriers / (2 * square);
		into.admittanceByNormal[j] = 0;
		into.deeper[j] = into.depth[j] * into.admittance[j];
		into.deeperByNormal[j] = 0;
	}
	for (let b = 1; b <= into.last; b++) {
		const [before, behind] = [materials[b - 1], materials[b]];
		if (behind.ideal) {
			setWhole(into, b, -1);
			continue;
		}
		const [onward, back] = [behind.mu * teKappas[b - 1], before.mu * teKappas[b]];
		const dMu = behind.mu - before.mu;
		const crossed = dMu * before.square - before.mu * (behind.square - before.square);
		const product = dMu * (before.mu + behind.mu) * y * y + before.mu * behind.mu * X * crossed;
		setAdmittances(into, b, product / (onward + back), onward, back);
	}
	respondDressed(into, 'te', isotropic);
}
