import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { aRequest, gold, post, silica, vacuum, type Request } from '../support/force-requests.ts';
import { startTestServer, type TestServer } from '../support/server.ts';

let server: TestServer;
beforeAll(async () => {
	server = await startTestServer();
}, 180_000);
afterAll(() => server?.stop());

const model = (permittivity: unknown) => ({ permittivity });
const table = (change: object) =>
	model({
		kind: 'table',
		energiesEv: [1, 2, 3],
		epsilon2: [0.1, 0.2, 0.1],
		lowEnd: { kind: 'none' },
		highEnd: { kind: 'power', exponent: 3 },
		...change
	});
const right = (request: Request, material: unknown) => (request.arrangement.right.substrate = material);

/** One field wrong at a time: what is spoilt, how, and the field that the answer must name. */
const WRONG: [path: string, spoil: (request: Request) => void][] = [
	['arrangement', (r) => Object.assign(r, { arrangement: 'gold' })],
	['arrangement.left', (r) => Object.assign(r.arrangement, { left: null })],
	['arrangement.left.substrate', (r) => Object.assign(r.arrangement.left, { substrate: 'gold' })],
	['arrangement.left.substrate.version', (r) => (r.arrangement.left.substrate = { version: 'Gold' })],
	['arrangement.left.substrate.version', (r) => (r.arrangement.left.substrate = { version: 'gold@99.0' })],
	[
		'arrangement.left.substrate.zeroFrequency',
		(r) => (r.arrangement.left.substrate = { ...gold, zeroFrequency: 'both' })
	],
	[
		'arrangement.left.substrate.zeroFrequency',
		(r) => (r.arrangement.left.substrate = { ...silica, zeroFrequency: 'plasma' })
	],
	['arrangement.left.layers', (r) => Object.assign(r.arrangement.left, { layers: {} })],
	['arrangement.left.layers[0].thicknessNm', (r) => (r.arrangement.left.layers[0].thicknessNm = -1)],
	['arrangement.left.layers[0].thicknessNm', (r) => (r.arrangement.left.layers[0].thicknessNm = '20')],
	['arrangement.left.layers[0].thicknessNm', (r) => (r.arrangement.left.layers[0].thicknessNm = 1e-9)],
	['arrangement.left.layers[0].of', (r) => (r.arrangement.left.layers[0].of = 7)],
	[
		'arrangement.left.layers[0].of.version',
		(r) => (r.arrangement.left.layers[0].of = { version: 'no-such@1.0' })
	],
	['arrangement.medium', (r) => Object.assign(r.arrangement, { medium: undefined })],
	['arrangement.medium.permittivity', (r) => (r.arrangement.medium = model({ kind: 'idealConductor' }))],
	['arrangement.medium.permittivity.kind', (r) => (r.arrangement.medium = model({ kind: 'aether' }))],
	['arrangement.right.substrate.permittivity.value', (r) => right(r, model({ kind: 'constant', value: -2 }))],
	[
		'arrangement.right.substrate.permittivity.dampingEv',
		(r) => right(r, model({ kind: 'drude', plasmaEnergyEv: 9, dampingEv: -1 }))
	],
	['arrangement.right.substrate.permittivity.plasmaEnergyEv', (r) => right(r, model({ kind: 'plasma' }))],
	['arrangement.right.substrate.permittivity.terms', (r) => right(r, model({ kind: 'lorentz', terms: [] }))],
	[
		'arrangement.right.substrate.permittivity.terms[0].relaxationTimePs',
		(r) => right(r, model({ kind: 'debye', terms: [{ strength: 1, relaxationTimePs: 0 }] }))
	],
	[
		'arrangement.right.substrate.permittivity.terms[0].strength',
		(r) => right(r, model({ kind: 'ninhamParsegian', terms: [{ strength: -5, frequencyRadPerS: 1e15 }] }))
	],
	[
		'arrangement.right.substrate.permittivity.siemensPerM',
		(r) => right(r, model({ kind: 'dcConductivity', siemensPerM: -1 }))
	],
	[
		'arrangement.right.substrate.permittivity.energiesEv[2]',
		(r) => right(r, table({ energiesEv: [1, 3, 2] }))
	],
	[
		'arrangement.right.substrate.permittivity.epsilon2[1]',
		(r) => right(r, table({ epsilon2: [0.1, -0.2, 0.1] }))
	],
	['arrangement.right.substrate.permittivity.energiesEv', (r) => right(r, table({ epsilon2: [0.1, 0.2] }))],
	[
		'arrangement.right.substrate.permittivity.lowEnd.kind',
		(r) => right(r, table({ lowEnd: { kind: 'guess' } }))
	],
	[
		'arrangement.right.substrate.permittivity.highEnd.exponent',
		(r) => right(r, table({ highEnd: { kind: 'power', exponent: -3 } }))
	],
	[
		'arrangement.right.substrate.permeability.value',
		(r) => right(r, { ...silica, permeability: { kind: 'constant', value: 0 } })
	],
	['arrangement.shape.kind', (r) => (r.arrangement.shape = { kind: 'cubes' })],
	['arrangement.shape.radiusUm', (r) => (r.arrangement.shape = { kind: 'spherePlate', radiusUm: 0 })],
	['arrangement.shape.rightRadiusUm', (r) => (r.arrangement.shape = { kind: 'spheres', leftRadiusUm: 5 })],
	['arrangement.temperatureK', (r) => (r.arrangement.temperatureK = -1)],
	['arrangement.temperatureK', (r) => (r.arrangement.temperatureK = 1e-9)],
	['arrangement.temperatureK', (r) => (r.arrangement.temperatureK = 1e9)],
	['arrangement.debyeLengthNm', (r) => (r.arrangement.debyeLengthNm = 0)],
	['arrangement.pressure', (r) => Object.assign(r.arrangement, { pressure: 1 })],
	['separationsNm', (r) => (r.separationsNm = [])],
	['separationsNm', (r) => (r.separationsNm = 'all')],
	['separationsNm[1]', (r) => (r.separationsNm = [10, 0])],
	['separationsNm[1]', (r) => (r.separationsNm = [10, null])],
	['separationsNm[0]', (r) => (r.separationsNm = [1e300])],
	['separationsNm.from', (r) => (r.separationsNm = { from: -1, to: 10, count: 3 })],
	['separationsNm.to', (r) => (r.separationsNm = { from: 10, to: 5, count: 3 })],
	['separationsNm.count', (r) => (r.separationsNm = { from: 1, to: 10, count: 2.5 })],
	['separationsNm.spacing', (r) => (r.separationsNm = { from: 1, to: 10, count: 3, spacing: 'cubic' })],
	['relativeAccuracy', (r) => (r.relativeAccuracy = 0)],
	['relativeAccuracy', (r) => (r.relativeAccuracy = 1e-15)],
	['include', (r) => (r.include = 'breakdown')],
	['include[0]', (r) => (r.include = ['everything'])],
	['separations', (r) => Object.assign(r, { separations: [10] })]
];

describe('each field wrong in turn', () => {
	it('begins with a request that is right', async () => {
		expect((await post(server.origin, aRequest())).status).toBe(200);
	});

	it.each(WRONG)('%s is named (case %#)', async (path, spoil) => {
		const answer = await post(server.origin, aRequest(spoil));
		const { error } = await answer.json();
		expect(answer.status).toBe(422);
		expect(error.issues.map((issue: { path: string }) => issue.path)).toContain(path);
		for (const { message } of error.issues) expect(message.length).toBeGreaterThan(8);
	});

	it('names a field that a material does not have', async () => {
		const answer = await post(
			server.origin,
			aRequest((r) => right(r, { ...silica, colour: 'red' }))
		);
		const { error } = await answer.json();
		expect(answer.status).toBe(422);
		expect(error.issues).toEqual([
			{
				path: 'arrangement.right.substrate.colour',
				message: expect.stringContaining('not a field')
			}
		]);
	});

	it('names all wrong fields, not the first only', async () => {
		const answer = await post(
			server.origin,
			aRequest((r) => {
				r.arrangement.temperatureK = -1;
				r.arrangement.left.layers[0].thicknessNm = 0;
				r.relativeAccuracy = 2;
			})
		);
		const { error } = await answer.json();
		expect(error.issues.map((issue: { path: string }) => issue.path).sort()).toEqual([
			'arrangement.left.layers[0].thicknessNm',
			'arrangement.temperatureK',
			'relativeAccuracy'
		]);
	});
});

describe('absurd requests', () => {
	const ABSURD: [what: string, spoil: (request: Request) => void][] = [
		['0.001 nm', (r) => (r.separationsNm = [0.001])],
		['a separation of 1e-320 nm', (r) => (r.separationsNm = [1e-320])],
		['a million points by count', (r) => (r.separationsNm = { from: 1, to: 1000, count: 1_000_000 })],
		['a hundred thousand points listed', (r) => (r.separationsNm = new Array(100_000).fill(10))],
		[
			'ten thousand layers',
			(r) => (r.arrangement.left.layers = new Array(10_000).fill({ of: vacuum, thicknessNm: 1 }))
		],
		[
			'five hundred layers',
			(r) => (r.arrangement.right.layers = new Array(500).fill({ of: silica, thicknessNm: 1 }))
		],
		[
			'sums in sums',
			(r) =>
				right(
					r,
					model(
						Array.from({ length: 1000 }).reduce((inner) => ({ kind: 'sum', of: [inner] }), { kind: 'vacuum' })
					)
				)
		]
	];

	it.each(ABSURD)('%s is refused within 100 ms, computing or not', async (_what, spoil) => {
		const text = JSON.stringify(aRequest(spoil));
		// The connection and the first parse are not what is measured.
		await post(server.origin, text);
		const asked = performance.now();
		const answer = await post(server.origin, text);
		expect(answer.status).toBe(422);
		expect(performance.now() - asked).toBeLessThan(100);
	});

	it('a hundred thousand levels of JSON are refused within 100 ms', async () => {
		const text = `{"arrangement":${'['.repeat(100_000)}${']'.repeat(100_000)}}`;
		await post(server.origin, text);
		const asked = performance.now();
		const answer = await post(server.origin, text);
		expect(answer.status).toBe(422);
		expect(performance.now() - asked).toBeLessThan(100);
	});

	it('work above the cap is refused with its estimate and the cap', async () => {
		const answer = await post(
			server.origin,
			aRequest((r) => {
				r.arrangement.left.layers = new Array(40).fill(0).map((_, i) => ({ of: silica, thicknessNm: 1 + i }));
				r.arrangement.right.layers = r.arrangement.left.layers;
				r.arrangement.temperatureK = 0;
				r.arrangement.shape = { kind: 'cylinderPlate', radiusUm: 10 };
				r.separationsNm = { from: 1, to: 1000, count: 2000 };
				r.relativeAccuracy = 1e-11;
			})
		);
		const { error } = await answer.json();
		expect([answer.status, error.code]).toEqual([422, 'too-costly']);
		expect(error.message).toMatch(/about .+ s; at most 30 s/);
	});
});
