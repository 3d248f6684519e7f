import { OPAQUE } from '../reflection/stack.ts';
import type { ZeroFrequencyMaterial } from '../reflection/zero-frequency.ts';
import type { Body } from '../system.ts';
import { respond, setAdmittances, setWhole, stackResponse, type StackResponse } from './stack-response.ts';

/** A body at one frequency: permittivity and permeability of each place, 0 the medium. */
export interface BodyAtFrequency {
	chi: Float64Array;
	mu: Float64Array;
	/** t/d of each layer, index 1... */
	thickness: Float64Array;
	ideal: boolean;
}

export const bodyAtFrequency = ({ thickness, places, ideal }: Body): BodyAtFrequency => ({
	chi: new Float64Array(places.length + 1),
	mu: new Float64Array(places.length + 1).fill(1),
	thickness: new Float64Array(thickness.length + 2),
	ideal
});

/** Response of both polarisations of a body. */
export interface BodyResponse {
	tm: StackResponse;
	te: StackResponse;
}

export const bodyResponse = (): BodyResponse => ({ tm: stackResponse(), te: stackResponse() });

const kappas = new Float64Array(64);

/**
 * A body at xi > 0 (methods.md sections 1, 3 and 10), K = (2 d k)^2 and X = (2 d xi/c)^2; derivatives are those at fixed
 * wave number k. With a = b - 1 and D = eps_b kappa_a + eps_a kappa_b:
 *
 *     d r_TM/d eps_b =  2 eps_a kappa_a (K + eps_b mu_b X/2)/(kappa_b D^2)
 *     d r_TM/d eps_a = -2 eps_b kappa_b (K + eps_a mu_a X/2)/(kappa_a D^2)
 *
 * and alike for TE: written so that nothing cancels.
 */
export function respondAtFrequency(
	into: BodyResponse,
	{ chi, mu, thickness, ideal }: BodyAtFrequency,
	K: number,
	X: number
): void {
	const { tm, te } = into;
	const places = chi.length - 1;
	const kappa = (j: number): number => Math.sqrt(K + (1 + chi[j]) * mu[j] * X);
	kappas[0] = kappa(0);
	let last = 0;
	let depth = 0;
	while (last < places && depth < OPAQUE) {
		const b = ++last;
		if (ideal && b === places) {
			setWhole(tm, b, 1);
			setWhole(te, b, -1);
			break;
		}
		const a = b - 1;
		kappas[b] = kappa(b);
		const [epsA, epsB, muA, muB, kappaA, kappaB] = [
			1 + chi[a],
			1 + chi[b],
			mu[a],
			mu[b],
			kappas[a],
			kappas[b]
		];
		const dEps = chi[b] - chi[a];
		const dMu = muB - muA;
		const tmSum = epsB * kappaA + epsA * kappaB;
		const teSum = muB * kappaA + muA * kappaB;
		const tmDifference = dEps * (epsA + epsB) * K + epsA * epsB * X * (dEps * muA - epsA * dMu);
		const teDifference = dMu * (muA + muB) * K + muA * muB * X * (dMu * epsA - muA * dEps);
		setAdmittances(tm, b, tmDifference / tmSum, epsB * kappaA, epsA * kappaB);
		setAdmittances(te, b, teDifference / teSum, muB * kappaA, muA * kappaB);
		tm.behind[b] = (2 * epsA * kappaA * (K + (epsB * muB * X) / 2)) / (kappaB * tmSum * tmSum);
		tm.before[b] = (-2 * epsB * kappaB * (K + (epsA * muA * X) / 2)) / (kappaA * tmSum * tmSum);
		te.behind[b] = (-muA * muB * muB * kappaA * X) / (kappaB * teSum * teSum);
		te.before[b] = (muA * muA * muB * kappaB * X) / (kappaA * teSum * teSum);
		if (b === places) break;
		for (const one of [tm, te]) {
			one.depth[b] = kappaB * thickness[b];
			one.deeper[b] = (thickness[b] * muB * X) / (2 * kappaB);
		}
		depth += tm.depth[b];
	}
	tm.last = last;
	te.last = last;
	respond(tm);
	respond(te);
}

/**
 * TM of a body at n = 0, where permittivities that stay finite count and conductors reflect wholly (methods.md section 2).
 *
 * @param y         2 d kappa of the gap: above 2 d k where ions screen
 * @param screened  the first interface is that of a medium with mobile ions
 */
export function respondAtZero(
	into: StackResponse,
	materials: readonly ZeroFrequencyMaterial[],
	thickness: Float64Array,
	y: number,
	k: number,
	screened: boolean
): void {
	const end = materials.findIndex(({ ideal }) => ideal);
	into.last = end < 0 ? materials.length - 1 : end;
	for (let b = 1; b <= into.last; b++) {
		const [before, behind] = [materials[b - 1], materials[b]];
		into.deeper[b] = 0;
		into.depth[b] = b < into.last ? k * thickness[b] : 0;
		if (behind.ideal || behind.order > before.order) setWhole(into, b, 1);
		else if (behind.order < before.order) setWhole(into, b, -1);
		else if (before.order > 0) {
			const difference = behind.amplitude - before.amplitude;
			setAdmittances(into, b, difference, behind.amplitude, before.amplitude);
			into.before[b] = 0;
			into.behind[b] = 0;
		} else {
			const [epsA, epsB] = [1 + before.amplitude, 1 + behind.amplitude];
			// Ions keep the field of the gap steeper than the wave number alone would.
			const [onward, back] = screened && b === 1 ? [epsB * k, epsA * y] : [epsB, epsA];
			const difference = screened && b === 1 ? onward - back : behind.amplitude - before.amplitude;
			setAdmittances(into, b, difference, onward, back);
			const sum = onward + back;
			into.behind[b] = (2 * back * (onward / epsB)) / (sum * sum);
			into.before[b] = (-2 * onward * (back / epsA)) / (sum * sum);
		}
	}
	respond(into);
}
