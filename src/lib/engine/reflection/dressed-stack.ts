import type { LogLattice } from '../numerics/log-lattice.ts';
import { coveredFromBack } from './covered-recursion.ts';
import { interfaces, MOST_INTERFACES } from './recursion.ts';
import { OPAQUE, type StackAtFrequency } from './stack.ts';

/** A stack whose places may be uniaxial, their axis along the normal, or carry a conducting sheet towards the gap. */
export interface DressedStack extends StackAtFrequency {
	/** eps - 1 along the normal, index 0 the medium; `chi` is that of the plane. */
	normal: Float64Array;
	/** sigma/(eps_0 c) of the sheet in front of each place; 0 where there is none. */
	sheet: Float64Array;
}

/** Work space of one stack. */
export const dressedStack = (layers: number): DressedStack => ({
	layers,
	chi: new Float64Array(layers + 2),
	normal: new Float64Array(layers + 2),
	mu: new Float64Array(layers + 2).fill(1),
	sheet: new Float64Array(layers + 2),
	thickness: new Float64Array(layers + 2),
	ideal: false
});

const tmKappas = new Float64Array(MOST_INTERFACES);
const teKappas = new Float64Array(MOST_INTERFACES);
const tmDepths = new Float64Array(MOST_INTERFACES);
const teDepths = new Float64Array(MOST_INTERFACES);
/** Admittance of the sheet at interface b over that of the place before it. */
const tmCovers = new Float64Array(MOST_INTERFACES);
const teCovers = new Float64Array(MOST_INTERFACES);
const tm = interfaces();
const te = interfaces();

/**
 * Reflection of a dressed stack over y = y0 + s (methods.md sections 3 and 4; Barash 1978, Drosdoff and Woods 2010). With
 * K = (2 d k)^2, X = (2 d xi/c)^2, p and z for the permittivities in the plane and along the normal:
 *
 *     kappa_TM = sqrt((eps_p/eps_z) K + eps_p mu X),  kappa_TE = sqrt(K + eps_p mu X)
 *     r_TM = (eps_b kappa_a - eps_a kappa_b)/(eps_b kappa_a + eps_a kappa_b)
 *     r_TE = (mu_b kappa_a - mu_a kappa_b)/(mu_b kappa_a + mu_a kappa_b)
 *
 * A sheet of sigma = g eps_0 c adds g/sqrt(X) to the admittance eps/kappa of what lies behind it in TM and g sqrt(X) to
 * kappa/mu in TE. Differences of permittivities come from susceptibilities, so that nothing cancels within an interface.
 */
export function dressedReflection(
	lattice: LogLattice,
	y0: number,
	X: number,
	stack: DressedStack,
	rTM: Float64Array,
	rTE: Float64Array
): void {
	const { layers, chi, normal, mu, sheet, thickness, ideal } = stack;
	const root = Math.sqrt(X);
	for (let i = 0; i < lattice.count; i++) {
		const s = lattice.s[i];
		const K = s * (2 * y0 + s);
		tmKappas[0] = y0 + s;
		teKappas[0] = y0 + s;
		let depth = 0;
		let last = 0;
		while (last <= layers && depth < OPAQUE) {
			const b = ++last;
			if (b > layers && ideal) {
				setTotal(1, -1, b);
				break;
			}
			const eps = 1 + chi[b];
			teKappas[b] = Math.sqrt(K + eps * mu[b] * X);
			tmKappas[b] =
				normal[b] === chi[b] ? teKappas[b] : Math.sqrt((eps / (1 + normal[b])) * K + eps * mu[b] * X);
			setInterface(b, K, X, root, chi, normal, mu, sheet[b]);
			tmDepths[b] = tmKappas[b] * thickness[b];
			teDepths[b] = teKappas[b] * thickness[b];
			depth += Math.min(tmDepths[b], teDepths[b]);
		}
		rTM[i] = coveredFromBack(tm, last, tmDepths, tmCovers, true);
		rTE[i] = coveredFromBack(te, last, teDepths, teCovers, false);
	}
}

function setTotal(rTM: number, rTE: number, b: number): void {
	for (const [into, r] of [
		[tm, rTM],
		[te, rTE]
	] as const) {
		tmCovers[b] = 0;
		teCovers[b] = 0;
		into.r[b] = r;
		into.plus[b] = 1 + r;
		into.minus[b] = 1 - r;
	}
}

function setInterface(
	b: number,
	K: number,
	X: number,
	root: number,
	chi: Float64Array,
	normal: Float64Array,
	mu: Float64Array,
	sheet: number
): void {
	const a = b - 1;
	const [epsA, epsB, zA, zB, muA, muB] = [1 + chi[a], 1 + chi[b], 1 + normal[a], 1 + normal[b], mu[a], mu[b]];
	const dEps = chi[b] - chi[a];
	const dNormal = normal[b] - normal[a];
	const dMu = muB - muA;
	const tmBack = epsA * tmKappas[b];
	const tmOnward = epsB * tmKappas[a];
	const tmDifference =
		(epsA * epsB * (((epsB * dNormal + zA * dEps) * K) / (zA * zB) + (dEps * muA - epsA * dMu) * X)) /
		(tmBack + tmOnward);
	tm.r[b] = tmDifference / (tmBack + tmOnward);
	tm.plus[b] = (2 * tmOnward) / (tmBack + tmOnward);
	tm.minus[b] = (2 * tmBack) / (tmBack + tmOnward);
	tmCovers[b] = (sheet * tmKappas[a]) / (root * epsA);
	const teBack = muA * teKappas[b];
	const teOnward = muB * teKappas[a];
	const teDifference =
		(dMu * (muA + muB) * K + muA * muB * X * (dMu * epsA - muA * dEps)) / (teBack + teOnward);
	te.r[b] = teDifference / (teBack + teOnward);
	te.plus[b] = (2 * teOnward) / (teBack + teOnward);
	te.minus[b] = (2 * teBack) / (teBack + teOnward);
	teCovers[b] = (sheet * root * muA) / teKappas[a];
}
