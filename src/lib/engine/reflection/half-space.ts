import type { LogLattice } from '../numerics/log-lattice.ts';

/**
 * Reflection of a half-space seen from the medium, at imaginary frequency xi, over y = 2 d q = y0 + s.
 * With K = (2 d k)^2 = s (2 y0 + s), X = (2 d xi/c)^2 and kappa in units of 1/(2 d):
 *
 *     kappa = sqrt(K + eps mu X)
 *     r_TM = [D_eps (eps_m + eps) K + eps_m eps X (D_eps mu_m - eps_m D_mu)]/(eps y + eps_m kappa)^2
 *     r_TE = [D_mu (mu_m + mu) K + mu_m mu X (D_mu eps_m - mu_m D_eps)]/(mu y + mu_m kappa)^2
 *
 * D_eps = eps - eps_m comes as a difference of susceptibilities: nothing cancels in a near-matched pair (methods.md
 * section 1, "Stable forms", extended to permeabilities).
 *
 * @param chiM, chi  eps - 1 of medium and body
 * @param muM, mu    permeabilities
 */
export function halfSpaceReflection(
	lattice: LogLattice,
	y0: number,
	X: number,
	chiM: number,
	chi: number,
	muM: number,
	mu: number,
	rTM: Float64Array,
	rTE: Float64Array
): void {
	const { count, s } = lattice;
	const epsM = 1 + chiM;
	const eps = 1 + chi;
	const dEps = chi - chiM;
	const dMu = mu - muM;
	const index = eps * mu * X;
	const tmK = dEps * (epsM + eps);
	const tmX = epsM * eps * X * (dEps * muM - epsM * dMu);
	const teK = dMu * (muM + mu);
	const teX = muM * mu * X * (dMu * epsM - muM * dEps);
	for (let i = 0; i < count; i++) {
		const K = s[i] * (2 * y0 + s[i]);
		const y = y0 + s[i];
		const kappa = Math.sqrt(K + index);
		const tm = eps * y + epsM * kappa;
		const te = mu * y + muM * kappa;
		rTM[i] = (tmK * K + tmX) / (tm * tm);
		rTE[i] = (teK * K + teX) / (te * te);
	}
}

/** An ideal conductor: r_TM = 1, r_TE = -1 at every frequency. */
export function idealReflection(count: number, rTM: Float64Array, rTE: Float64Array): void {
	for (let i = 0; i < count; i++) {
		rTM[i] = 1;
		rTE[i] = -1;
	}
}
