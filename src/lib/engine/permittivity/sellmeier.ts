import type { SellmeierModel } from '../contract.ts';
import { radPerSFromWavelength } from '../units.ts';
import { ninhamParsegian } from './ninham-parsegian.ts';
import type { Susceptibility } from './susceptibility.ts';

/** Points of the Cauchy plot, even in wavelength. */
const POINTS = 36;

/** The line through the plot keeps fewer digits than a closed form. */
const FITTED_ULPS = 100;

/** One undamped oscillator; eps(i xi) - 1 = strength/(1 + xi^2/frequency^2). */
export interface OscillatorPair {
	strength: number;
	/** rad/s. */
	frequency: number;
}

const metres = (micrometres: number): number => micrometres * 1e-6;

/** A pole at a wavelength beyond the band absorbs in the infrared and stays as it is; the others are put into the pair. */
export const isInfrared = ({ bandUm }: SellmeierModel, wavelengthUm: number): boolean =>
	wavelengthUm > bandUm.to;

/**
 * The ultraviolet pair of an index formula by a Cauchy plot: n^2 - 1 without its infrared poles, drawn against the same
 * times omega^2 over the band, is a line of intercept C and slope 1/omega_UV^2. Poles of such formulae are aids
 * of fitting and no measured absorptions; continued to imaginary frequency directly they overstate forces by 10 to 70 %
 * (reference on dielectrics).
 *
 * @returns null where the formula has no ultraviolet part, or one without dispersion or below one (no pair has that)
 */
export function ultravioletPair(model: SellmeierModel): OscillatorPair | null {
	const { terms, constant, bandUm } = model;
	const x: number[] = [];
	const y: number[] = [];
	for (let i = 0; i < POINTS; i++) {
		const wavelength = bandUm.from + ((bandUm.to - bandUm.from) * i) / (POINTS - 1);
		let excess = constant;
		for (const { strength, wavelengthUm } of terms) {
			if (isInfrared(model, wavelengthUm)) continue;
			const ratio = wavelengthUm / wavelength;
			excess += strength / (1 - ratio * ratio);
		}
		y.push(excess);
		x.push(excess * radPerSFromWavelength(metres(wavelength)) ** 2);
	}
	const mean = (values: number[]): number => values.reduce((sum, value) => sum + value, 0) / values.length;
	const [meanX, meanY] = [mean(x), mean(y)];
	let covariance = 0;
	let variance = 0;
	for (let i = 0; i < POINTS; i++) {
		covariance += (x[i] - meanX) * (y[i] - meanY);
		variance += (x[i] - meanX) ** 2;
	}
	const slope = covariance / variance;
	const strength = meanY - slope * meanX;
	if (!(slope > 0) || !(strength > 0)) return null;
	return { strength, frequency: 1 / Math.sqrt(slope) };
}

/**
 * An index formula n^2 = 1 + constant + sum B L^2.../(lambda^2 - L^2) as oscillators: the infrared poles and the ultraviolet
 * pair of the Cauchy plot. It says nothing of what relaxes below the infrared: add a Debye part for a polar liquid.
 */
export function sellmeier(model: SellmeierModel): Susceptibility[] {
	const pair = ultravioletPair(model);
	const infrared = model.terms
		.filter(({ wavelengthUm }) => isInfrared(model, wavelengthUm))
		.map(({ strength, wavelengthUm }) =>
			ninhamParsegian(strength, radPerSFromWavelength(metres(wavelengthUm)))
		);
	if (pair === null) return infrared;
	return [...infrared, { ...ninhamParsegian(pair.strength, pair.frequency), ulps: FITTED_ULPS }];
}
