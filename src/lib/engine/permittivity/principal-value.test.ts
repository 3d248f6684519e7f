import { describe, expect, it } from 'vitest';
import type { PermittivityModel } from '../contract.ts';
import { RAD_PER_S_PER_EV } from '../units.ts';
import { permittivityOnRealAxis } from './evaluator.ts';

/** eps'' of one Lorentz oscillator sampled on a logarithmic grid; its eps' is known in closed form. */
function sampled(strengthEv2: number, energyEv: number, dampingEv: number, rows: number) {
	const energiesEv = Array.from({ length: rows }, (_, i) => 0.003 * 1e4 ** (i / (rows - 1)));
	const lorentz: PermittivityModel = { kind: 'lorentz', terms: [{ strengthEv2, energyEv, dampingEv }] };
	const exact = permittivityOnRealAxis(lorentz);
	const table: PermittivityModel = {
		kind: 'table',
		energiesEv,
		epsilon2: energiesEv.map((eV) => exact(eV * RAD_PER_S_PER_EV).epsIm),
		lowEnd: { kind: 'power', exponent: 1 },
		highEnd: { kind: 'power', exponent: 3 }
	};
	return { exact, table: permittivityOnRealAxis(table) };
}

describe("eps' of a table by Kramers-Kronig", () => {
	it.each([
		['broad', 16, 3, 0.5, 2000, [0.05, 1, 2.7, 3.3, 8]],
		// A phonon: eps'' grows like omega^100 at its foot, where a law continued too far would swamp everything.
		['sharp', 0.05, 0.1, 6e-4, 20_000, [0.01, 0.05, 0.09, 0.12, 1]]
	] as const)('follows a %s oscillator', (_, strength, energy, damping, rows, energiesEv) => {
		const { exact, table } = sampled(strength, energy, damping, rows);
		for (const eV of energiesEv) {
			const omega = eV * RAD_PER_S_PER_EV;
			const susceptibility = exact(omega).epsRe - 1;
			expect(Math.abs((table(omega).epsRe - 1) / susceptibility - 1), `${eV} eV`).toBeLessThan(2e-3);
		}
	});

	it('stays finite and steady across a knot', () => {
		const { table } = sampled(16, 3, 0.5, 200);
		const knot = 0.003 * 1e4 ** (150 / 199) * RAD_PER_S_PER_EV;
		const [before, at, after] = [1 - 1e-6, 1, 1 + 1e-6].map((factor) => table(knot * factor).epsRe);
		expect(Math.abs(at - before)).toBeLessThan(1e-3);
		expect(Math.abs(at - after)).toBeLessThan(1e-3);
	});
});
