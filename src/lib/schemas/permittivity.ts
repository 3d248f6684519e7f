import { z } from 'zod';
import type { PermeabilityModel, PermittivityModel } from '../engine/contract.ts';

/** The contract's MODEL and PERMEABILITY. Whether the numbers make physical sense is the engine's to say. */

const finite = z.number();
const positive = z.number().positive();
const nonNegative = z.number().nonnegative();

export const TABLE_ROWS_MAX = 20_000;
const TERMS_MAX = 64;
const SUM_DEPTH_MAX = 4;

export const lowEnd = z
	.discriminatedUnion('kind', [
		z.strictObject({ kind: z.literal('drude'), plasmaEnergyEv: positive, dampingEv: positive }),
		z.strictObject({ kind: z.literal('plasma'), plasmaEnergyEv: positive }),
		z.strictObject({ kind: z.literal('power'), exponent: finite }),
		z.strictObject({ kind: z.literal('none') })
	])
	.meta({ id: 'LowEnd', description: "eps'' below the first point of the table" });

export const highEnd = z
	.discriminatedUnion('kind', [
		z.strictObject({ kind: z.literal('power'), exponent: positive }),
		z.strictObject({ kind: z.literal('none') })
	])
	.meta({ id: 'HighEnd', description: "eps'' above the last point of the table" });

const rows = (what: z.ZodNumber) => z.array(what).min(2).max(TABLE_ROWS_MAX);
const terms = <T extends z.ZodType>(term: T) => z.array(term).min(1).max(TERMS_MAX);

const band = { amplitudeEv: nonNegative, energyEv: positive, broadeningEv: positive, gapEv: positive };

const closedForms = [
	z.strictObject({ kind: z.literal('vacuum') }),
	z.strictObject({ kind: z.literal('constant'), value: positive }),
	z.strictObject({ kind: z.literal('idealConductor') }),
	z.strictObject({ kind: z.literal('drude'), plasmaEnergyEv: positive, dampingEv: nonNegative }),
	z.strictObject({ kind: z.literal('plasma'), plasmaEnergyEv: positive }),
	z.strictObject({
		kind: z.literal('lorentz'),
		terms: terms(z.strictObject({ strengthEv2: finite, energyEv: nonNegative, dampingEv: nonNegative }))
	}),
	z.strictObject({
		kind: z.literal('debye'),
		terms: terms(z.strictObject({ strength: finite, relaxationTimePs: positive }))
	}),
	z.strictObject({
		kind: z.literal('ninhamParsegian'),
		terms: terms(z.strictObject({ strength: finite, frequencyRadPerS: positive }))
	}),
	z.strictObject({ kind: z.literal('dcConductivity'), siemensPerM: nonNegative }),
	z.strictObject({
		kind: z.literal('table'),
		energiesEv: rows(positive),
		epsilon2: rows(nonNegative),
		lowEnd,
		highEnd
	}),
	z.strictObject({
		kind: z.literal('imaginaryTable'),
		frequenciesRadPerS: rows(positive),
		epsilon: rows(positive)
	}),
	z.strictObject({
		kind: z.literal('brendelBormann'),
		terms: terms(
			z.strictObject({
				strengthEv2: nonNegative,
				energyEv: positive,
				dampingEv: nonNegative,
				widthEv: positive
			})
		)
	}),
	z.strictObject({ kind: z.literal('taucLorentz'), terms: terms(z.strictObject(band)) }),
	z.strictObject({
		kind: z.literal('codyLorentz'),
		terms: terms(z.strictObject({ ...band, transitionEv: positive }))
	}),
	z.strictObject({
		kind: z.literal('sellmeier'),
		terms: terms(z.strictObject({ strength: nonNegative, wavelengthUm: positive })),
		constant: finite,
		bandUm: z.strictObject({ from: positive, to: positive })
	})
] as const;

export const temperatureLaw = z
	.discriminatedUnion('kind', [
		z.strictObject({
			kind: z.literal('polynomial'),
			coefficients: z.array(finite).min(1).max(12),
			scale: z.enum(['kelvin', 'celsius'])
		}),
		z.strictObject({
			kind: z.literal('arrhenius'),
			value: finite,
			referenceK: positive,
			activationK: finite
		}),
		z.strictObject({
			kind: z.literal('blochGruneisen'),
			value: finite,
			referenceK: positive,
			debyeK: positive,
			residualShare: z.number().min(0).max(1)
		})
	])
	.meta({ id: 'TemperatureLaw', description: 'a parameter of a model as a function of the temperature' });

/** Sums nest, so the depth is limited while parsing: a request cannot be deeper than the engine is meant to go. */
function modelOfDepth(depth: number): z.ZodType<PermittivityModel> {
	if (depth === 0) return z.discriminatedUnion('kind', [...closedForms]);
	const inner = modelOfDepth(depth - 1);
	const sum = z.strictObject({ kind: z.literal('sum'), of: z.array(inner).min(1).max(TERMS_MAX) });
	const mixture = <K extends 'maxwellGarnett' | 'bruggeman'>(kind: K) =>
		z.strictObject({
			kind: z.literal(kind),
			host: inner,
			inclusion: inner,
			fraction: z.number().min(0).max(1)
		});
	const thermal = z.strictObject({
		kind: z.literal('temperatureDependent'),
		of: inner,
		rangeK: z.strictObject({ from: positive, to: positive }),
		laws: z.array(z.strictObject({ parameter: z.string().max(60), law: temperatureLaw })).max(TERMS_MAX)
	});
	return z.discriminatedUnion('kind', [
		...closedForms,
		sum,
		mixture('maxwellGarnett'),
		mixture('bruggeman'),
		thermal
	]);
}

export const permittivityModel = modelOfDepth(SUM_DEPTH_MAX).meta({
	id: 'PermittivityModel',
	description: 'Relative permittivity on the imaginary axis; energies mean hbar*omega in eV'
});

export const permeabilityModel: z.ZodType<PermeabilityModel> = z
	.discriminatedUnion('kind', [
		z.strictObject({ kind: z.literal('constant'), value: positive }),
		z.strictObject({ kind: z.literal('staticOnly'), value: positive }),
		z.strictObject({ kind: z.literal('debye'), value: positive, relaxationTimePs: positive })
	])
	.meta({ id: 'PermeabilityModel', description: 'Relative permeability; 1 where absent' });
