import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { logLattice } from '../numerics/log-lattice.ts';
import { halfSpaceReflection } from './half-space.ts';
import { stackAtFrequency, stackReflection } from './stack.ts';

const lattice = logLattice(0.5, 1, 1e-12);
const arrays = (): [Float64Array, Float64Array] => [
	new Float64Array(lattice.count),
	new Float64Array(lattice.count)
];

interface Layers {
	chi: number[];
	thickness: number[];
}

function stackOf({ chi, thickness }: Layers): [Float64Array, Float64Array] {
	const stack = stackAtFrequency(thickness.length);
	chi.forEach((value, i) => (stack.chi[i] = value));
	thickness.forEach((value, i) => (stack.thickness[i + 1] = value));
	const [tm, te] = arrays();
	stackReflection(lattice, 0.3, 0.09 / (1 + chi[0]), stack, tm, te);
	return [tm, te];
}

/** The same by admittances, Y_in = Y (Y' + Y tanh)/(Y + Y' tanh): no recursion of coefficients (methods.md section 3). */
function byAdmittances({ chi, thickness }: Layers, s: number, polarisation: 'tm' | 'te'): number {
	const y0 = 0.3;
	const X = 0.09 / (1 + chi[0]);
	const K = s * (2 * y0 + s);
	const kappa = chi.map((value) => Math.sqrt(K + (1 + value) * X));
	const own = kappa.map((value, j) => (polarisation === 'tm' ? (1 + chi[j]) / value : value));
	let seen = own[own.length - 1];
	for (let j = thickness.length; j >= 1; j--) {
		const t = Math.tanh((kappa[j] * thickness[j - 1]) / 2);
		seen = (own[j] * (seen + own[j] * t)) / (own[j] + seen * t);
	}
	const r = (seen - own[0]) / (seen + own[0]);
	return polarisation === 'tm' ? r : -r;
}

const chi = fc.oneof(
	fc.double({ min: 1e-3, max: 20, noNaN: true }),
	fc.double({ min: 1e2, max: 1e6, noNaN: true })
);
const thickness = fc.double({ min: 1e-3, max: 30, noNaN: true });

describe('a stack', () => {
	it('reflects like its admittances', () => {
		fc.assert(
			fc.property(
				fc.array(thickness, { minLength: 1, maxLength: 5 }),
				fc.array(chi, { minLength: 7, maxLength: 7 }),
				(t, c) => {
					const layers = { chi: [c[0] % 20, ...c.slice(1, t.length + 2)], thickness: t };
					const [tm, te] = stackOf(layers);
					for (let i = 0; i < lattice.count; i += 3) {
						expect(tm[i]).toBeCloseTo(byAdmittances(layers, lattice.s[i], 'tm'), 12);
						expect(te[i]).toBeCloseTo(byAdmittances(layers, lattice.s[i], 'te'), 12);
					}
				}
			)
		);
	});

	it('of one material is that material, to the last digits', () => {
		const [tm, te] = stackOf({ chi: [0, 3, 3, 3], thickness: [0.01, 2] });
		const [bulkTm, bulkTe] = arrays();
		halfSpaceReflection(lattice, 0.3, 0.09, 0, 3, 1, 1, bulkTm, bulkTe);
		tm.forEach((value, i) => expect(Math.abs(value - bulkTm[i])).toBeLessThan(4e-16));
		te.forEach((value, i) => expect(Math.abs(value - bulkTe[i])).toBeLessThan(4e-16));
	});

	it('of the medium alone reflects nothing at all', () => {
		const [tm, te] = stackOf({ chi: [2, 2, 2], thickness: [1] });
		expect([...tm, ...te].every((value) => value === 0)).toBe(true);
	});

	it('keeps a good conductor of vanishing thickness accurate', () => {
		// 1 + r rho e is 1e-8 here; the digits must not go with it.
		const layers = { chi: [0, 1e8, 2], thickness: [1e-6] };
		const [tm] = stackOf(layers);
		for (let i = 0; i < lattice.count; i += 3) {
			expect(tm[i] / byAdmittances(layers, lattice.s[i], 'tm') - 1).toBeCloseTo(0, 13);
		}
	});
});

describe('a half-space', () => {
	it('keeps relative accuracy at contrasts down to 1e-14', () => {
		for (const contrast of [1e-3, 1e-8, 1e-14]) {
			const [tm, te] = arrays();
			halfSpaceReflection(lattice, 0.3, 0.09 / 4, 3, 3 + contrast, 1, 1, tm, te);
			const exact = 3 + contrast - 3;
			// First order in the contrast: r_TM = d (2 eps K + eps^2 X)/(2 eps y)^2, r_TE = -d X/(2 y)^2.
			tm.forEach((value, i) => {
				const s = lattice.s[i];
				const y = 0.3 + s;
				const K = s * (0.6 + s);
				expect(value / ((exact * (8 * K + (16 * 0.09) / 4)) / (8 * y) ** 2)).toBeCloseTo(
					1,
					contrast > 1e-4 ? 2 : 7
				);
				expect(te[i] / ((-exact * 0.09) / 4 / (2 * y) ** 2)).toBeCloseTo(1, contrast > 1e-4 ? 2 : 7);
			});
		}
	});

	it('exchanges TE and TM when permittivity and permeability change places', () => {
		const [tm, te] = arrays();
		const [dualTm, dualTe] = arrays();
		halfSpaceReflection(lattice, 0.3, 0.09, 0, 4, 1, 2, tm, te);
		halfSpaceReflection(lattice, 0.3, 0.09, 0, 1, 1, 5, dualTm, dualTe);
		tm.forEach((value, i) => expect(value).toBeCloseTo(dualTe[i], 14));
		te.forEach((value, i) => expect(value).toBeCloseTo(dualTm[i], 14));
	});
});
