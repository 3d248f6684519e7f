import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { study as studySchema, type Study } from './study.ts';
import { slotsOf } from './study-slots.ts';
import { decodeStudy } from './study-address.ts';
import { encodeStudy } from './study-encode.ts';
import { WORKED_STUDY } from './study-worked.ts';

const decode = (query: string) => decodeStudy(new URLSearchParams(query));

const version = fc.constantFrom(
	'gold-drude@1.0',
	'silica-two-oscillators@1.0',
	'water-6uv@12.3',
	'vacuum@1.0'
);
const rule = fc.constantFrom('drude', 'plasma', 'ideal', 'dcCounted', 'dcIgnored');
const plain = fc.record({ version, zeroFrequency: rule }, { requiredKeys: ['version'] });
const material = fc.record(
	{
		version,
		normal: version,
		sheetSiemens: fc.double({ min: 1e-12, max: 1e3, noNaN: true }),
		zeroFrequency: rule
	},
	{ requiredKeys: ['version'] }
);
const thicknessNm = fc.double({ min: 0.1, max: 1e6, noNaN: true });
const separation = fc.double({ min: 1, max: 9000, noNaN: true });
const body = fc.record({
	layers: fc.array(fc.record({ of: material, thicknessNm }), { maxLength: 4 }),
	substrate: material
});
const radiusUm = fc.double({ min: 0.001, max: 1e6, noNaN: true });
const shape = fc.oneof(
	fc.constant({ kind: 'plates' }),
	fc.record({ kind: fc.constant('spherePlate'), radiusUm }),
	fc.record({ kind: fc.constant('spheres'), leftRadiusUm: radiusUm, rightRadiusUm: radiusUm })
);

/** One statement of ions at most. */
const ions = fc.oneof(
	fc.constant({}),
	fc.record({ debyeLengthNm: fc.double({ min: 0.1, max: 1e6, noNaN: true }) }),
	fc.record({
		salt: fc.record({
			molPerL: fc.double({ min: 1e-9, max: 10, noNaN: true }),
			valence: fc.constantFrom(1 as const, 2 as const, 3 as const)
		})
	}),
	fc.constant({ ions: 'off' as const })
);

/** Any study, choices included; slots of the choices are picked from those the arrangement has. */
const anyStudy: fc.Arbitrary<Study> = fc
	.record(
		{
			left: body,
			medium: plain,
			right: body,
			shape,
			temperatureK: fc.oneof(fc.constant(0), fc.double({ min: 0.5, max: 5000, noNaN: true })),
			roughness: fc.constantFrom({ leftNm: 1 }, { rightNm: 0.25 }, { leftNm: 3.5, rightNm: 2 }),
			dataUncertainty: fc.double({ min: 1e-4, max: 1, noNaN: true }),
			fromNm: fc.constantFrom(1, 0.5, 0.1),
			toNm: fc.constantFrom(10_000, 1e5, 9001.5),
			quantity: fc.constantFrom('pressure', 'energy', 'gradient'),
			atNm: separation,
			parkedNm: separation,
			marks: fc.array(
				fc.record({ label: fc.string({ minLength: 1, maxLength: 24 }), separationNm: thicknessNm }),
				{ maxLength: 6 }
			),
			against: fc.constantFrom('ideal', 0)
		},
		{
			requiredKeys: [
				...([
					'left',
					'medium',
					'right',
					'shape',
					'temperatureK',
					'fromNm',
					'toNm',
					'quantity',
					'atNm',
					'marks',
					'against'
				] as const)
			]
		}
	)
	.chain((bare) => {
		const slots = slotsOf({ ...WORKED_STUDY, ...bare } as Study);
		const change = fc.oneof(
			fc.record({ version }),
			fc.record({ zeroFrequency: fc.oneof(rule, fc.constant('written')) }),
			fc.record({ version, zeroFrequency: rule })
		);
		const choice = fc.record(
			{
				name: fc.string({ maxLength: 60 }),
				changes: fc.dictionary(fc.constantFrom(...slots), change, { maxKeys: 3 }),
				debyeLengthNm: fc.oneof(
					fc.constant('none'),
					fc.constant('off'),
					fc.double({ min: 0.1, max: 1e6, noNaN: true })
				)
			},
			{ requiredKeys: ['name', 'changes'] }
		);
		return fc
			.array(choice, { minLength: 1, maxLength: 5 })
			.chain((choices) => ions.map((one) => studySchema.parse({ ...bare, ...one, choices })));
	});

describe('a study in an address', () => {
	it('comes back from its address as it went in', () => {
		fc.assert(
			fc.property(anyStudy, (study) => {
				const { study: back, problems } = decode(encodeStudy(study));
				expect(problems).toEqual([]);
				expect(back).toEqual(study);
			}),
			{ numRuns: 400 }
		);
	});

	it('is readable: names, thickness and rules stand as they are written', () => {
		const study = structuredClone(WORKED_STUDY);
		study.left.layers.push({ of: { version: 'silica-two-oscillators@1.0' }, thicknessNm: 20 });
		study.left.substrate.zeroFrequency = 'plasma';
		expect(encodeStudy(study)).toBe(
			'?left=silica-two-oscillators@1.0:20nm,gold-lorentz-drude@1.0!plasma&medium=bromobenzene-debye-uv@1.0' +
				'&right=silica-two-oscillators@1.0&T=300&choice=Debye+and+one+UV+term' +
				'&choice=Seven+oscillators;medium:bromobenzene-seven-oscillators@1.0&at=38'
		);
	});

	it('without parts is the worked arrangement', () => {
		expect(decode('')).toEqual({ study: WORKED_STUDY, problems: [] });
	});

	it('with one body takes the rest from the worked arrangement and makes one choice', () => {
		const { study, problems } = decode('left=silver-drude@1.0');
		expect(problems).toEqual([]);
		expect(study.left.substrate.version).toBe('silver-drude@1.0');
		expect(study.right).toEqual(WORKED_STUDY.right);
		expect(study.choices).toEqual([{ name: '', changes: {} }]);
	});

	it.each([
		['left=Golld', 'left', 'not the name of a version'],
		['left=gold-drude@1.0,silica-a@1.0', 'left', 'needs a thickness'],
		['left=gold-drude@1.0:-5nm,silica-a@1.0', 'left', 'needs a thickness'],
		['medium=vacuum@1.0!fast', 'medium', 'not drude, plasma, ideal'],
		['T=-3', 'T', 'not a number of K'],
		['T=hot', 'T', 'not a number of K'],
		['at=1e9', 'at', 'not a number of nm'],
		['from=100&to=10', 'to', 'is empty'],
		['shape=cube', 'shape', 'not a shape'],
		['shape=spheres:3', 'shape', '2 radii'],
		['show=force', 'show', 'plates have no total force'],
		['show=beauty', 'show', 'not pressure'],
		['against=4', 'against', 'no model choice'],
		['choice=A;left7:gold-drude@1.0', 'choice', 'no place'],
		['choice=A;medium:', 'choice', 'changes nothing'],
		['mark=contact', 'mark', 'name with a length'],
		['mark=:3nm', 'mark', 'name with a length'],
		['choice=A;debye:wet', 'choice', 'not a Debye length'],
		['salt=much', 'salt', 'concentration in mol/L and a valence'],
		['salt=0.1,9', 'salt', 'concentration in mol/L and a valence'],
		['ions=on', 'ions', 'is not off'],
		['debye=3&ions=off', 'ions', 'stated twice'],
		['rough=1', 'rough', 'rms of the left and of the right surface'],
		['uncertainty=5', 'uncertainty', 'not a relative uncertainty'],
		['choice=1&choice=2&choice=3&choice=4&choice=5&choice=6', 'choice', 'only the first 5']
	])('reports %s and goes on', (query, part, words) => {
		const { study, problems } = decode(query);
		expect(problems.some((problem) => problem.part === part && problem.message.includes(words))).toBe(true);
		expect(studySchema.safeParse(study).success).toBe(true);
	});

	it('never fails, whatever stands in the address', () => {
		const part = fc.constantFrom(
			'left',
			'medium',
			'right',
			'choice',
			'T',
			'at',
			'from',
			'to',
			'shape',
			'against',
			'parked'
		);
		fc.assert(
			fc.property(fc.array(fc.tuple(part, fc.string({ maxLength: 80 }))), (entries) => {
				const { study } = decodeStudy(new URLSearchParams(entries));
				expect(studySchema.safeParse(study).success).toBe(true);
			}),
			{ numRuns: 400 }
		);
	});
});
