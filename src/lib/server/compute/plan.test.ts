import { describe, expect, it } from 'vitest';
import type { PermittivityModel } from '../../engine/contract.ts';
import { forceRequest } from '../../schemas/force.ts';
import { inputChecksum, pinnedVersions, resolveRequest } from './plan.ts';

const gold: PermittivityModel = { kind: 'drude', plasmaEnergyEv: 9, dampingEv: 0.035 };
const silica: PermittivityModel = { kind: 'constant', value: 2.1 };
const library = new Map<string, PermittivityModel>([
	['gold-drude@1.0', gold],
	['silica-constant@1.0', silica]
]);
const modelOf = (version: string) => library.get(version);

function request(change: object = {}, rest: object = {}) {
	return forceRequest.parse({
		arrangement: {
			left: {
				layers: [{ of: { version: 'silica-constant@1.0' }, thicknessNm: 5 }],
				substrate: { version: 'gold-drude@1.0', zeroFrequency: 'plasma' }
			},
			medium: { permittivity: { kind: 'vacuum' } },
			right: { substrate: { version: 'gold-drude@1.0' } },
			...change
		},
		separationsNm: [10, 20],
		...rest
	});
}

const checksumOf = (complete: ReturnType<typeof request>) => inputChecksum(resolveRequest(complete, modelOf));

describe('pinnedVersions', () => {
	it('lists each version once', () => {
		expect(pinnedVersions(request())).toEqual(['silica-constant@1.0', 'gold-drude@1.0']);
	});
});

describe('versions inside a material', () => {
	const dressed = request({
		left: {
			substrate: {
				permittivity: {
					kind: 'bruggeman',
					host: { version: 'silica-constant@1.0' },
					inclusion: { kind: 'vacuum' },
					fraction: 0.2
				},
				sheet: { kind: 'constant', siemens: 6e-5 }
			}
		},
		right: { substrate: { version: 'gold-drude@1.0', normal: { version: 'silica-constant@1.0' } } }
	});

	it('are found in mixtures and along an axis', () => {
		expect(pinnedVersions(dressed)).toEqual(['silica-constant@1.0', 'gold-drude@1.0']);
	});

	it('are replaced by their models there too', () => {
		const { left, right } = resolveRequest(dressed, modelOf).arrangement;
		expect(left.substrate).toEqual({
			permittivity: { kind: 'bruggeman', host: silica, inclusion: { kind: 'vacuum' }, fraction: 0.2 },
			sheet: { kind: 'constant', siemens: 6e-5 }
		});
		expect(right.substrate).toEqual({ permittivity: gold, normal: { permittivity: silica } });
	});

	it('are named where they do not exist', () => {
		const unknown = request({
			right: {
				substrate: {
					version: 'gold-drude@1.0',
					normal: { version: 'lost@1.0' }
				}
			},
			medium: {
				permittivity: {
					kind: 'maxwellGarnett',
					host: { version: 'silica-constant@1.0' },
					inclusion: { version: 'gone@2.0' },
					fraction: 0.1
				}
			}
		});
		try {
			resolveRequest(unknown, modelOf);
			expect.unreachable();
		} catch (error) {
			expect(error).toMatchObject({
				issues: [
					{ path: 'arrangement.medium.permittivity.inclusion.version' },
					{ path: 'arrangement.right.substrate.normal.version' }
				]
			});
		}
	});

	it('are told from slips of the pen', () => {
		const parsed = forceRequest.safeParse({
			...request(),
			arrangement: {
				...request().arrangement,
				medium: {
					permittivity: {
						kind: 'bruggeman',
						host: { version: 'no name' },
						inclusion: { kind: 'glas' },
						fraction: 2
					}
				}
			}
		});
		expect(parsed.error?.issues.map(({ path }) => path.join('.'))).toEqual([
			'arrangement.medium.permittivity.host.version',
			'arrangement.medium.permittivity.inclusion.kind',
			'arrangement.medium.permittivity.fraction'
		]);
	});
});

describe('resolveRequest', () => {
	it('puts models in the place of versions and keeps what was said beside them', () => {
		const { arrangement } = resolveRequest(request(), modelOf);
		expect(arrangement.left).toEqual({
			layers: [{ of: { permittivity: silica }, thicknessNm: 5 }],
			substrate: { permittivity: gold, zeroFrequency: 'plasma' }
		});
		expect(arrangement.right).toEqual({ layers: [], substrate: { permittivity: gold } });
		expect(arrangement.temperatureK).toBe(300);
	});

	it('takes the uncertainty of a version only where it is asked for, and after what the request states', () => {
		const stated = { kind: 'scale', relative: 0.02 } as const;
		const uncertainty = (rest: object, change: object = {}) =>
			resolveRequest(request(change, rest), modelOf, () => stated).arrangement.right.substrate.uncertainty;
		expect(uncertainty({})).toBeUndefined();
		expect(uncertainty({ include: ['uncertainty'] })).toEqual(stated);
		const own = { kind: 'scale', relative: 0.1 };
		const right = { substrate: { version: 'gold-drude@1.0', uncertainty: own } };
		expect(uncertainty({ include: ['uncertainty'] }, { right })).toEqual(own);
	});

	it('puts models in the place of versions that rivals name', () => {
		const rivals = [{ places: ['medium'], of: { version: 'silica-constant@1.0' } }];
		expect(pinnedVersions(request({}, { rivals }))).toContain('silica-constant@1.0');
		expect(resolveRequest(request({}, { rivals }), modelOf).rivals).toEqual([
			{ places: ['medium'], of: { permittivity: silica } }
		]);
		const missing = [{ places: ['medium'], of: { version: 'ice@1.0' } }];
		expect(() => resolveRequest(request({}, { rivals: missing }), modelOf)).toThrow(
			expect.objectContaining({ issues: [expect.objectContaining({ path: 'rivals[0].of.version' })] })
		);
	});

	it('names every place of a version that does not exist', () => {
		const unknown = request({
			medium: { version: 'water@9.0' },
			right: {
				layers: [{ of: { version: 'ice@1.0' }, thicknessNm: 1 }],
				substrate: { version: 'gold-drude@1.0' }
			}
		});
		expect(() => resolveRequest(unknown, modelOf)).toThrow(
			expect.objectContaining({
				code: 'unknown-version',
				issues: [
					{ path: 'arrangement.medium.version', message: 'there is no published version water@9.0' },
					{
						path: 'arrangement.right.layers[0].of.version',
						message: 'there is no published version ice@1.0'
					}
				]
			})
		);
	});
});

describe('inputChecksum', () => {
	it('is the same for a pinned version and for its model in place', () => {
		const inPlace = request({ right: { substrate: { permittivity: gold } } });
		expect(checksumOf(inPlace)).toBe(checksumOf(request()));
	});

	it('is the same for a default that is left out or spelled out', () => {
		const spelledOut = request(
			{ temperatureK: 300, shape: { kind: 'plates' } },
			{ relativeAccuracy: 1e-6, include: [] }
		);
		expect(checksumOf(spelledOut)).toBe(checksumOf(request()));
	});

	it('is another one for every single change', () => {
		const changed = [
			request(),
			request({ temperatureK: 301 }),
			request({ debyeLengthNm: 10 }),
			request({ shape: { kind: 'spherePlate', radiusUm: 50 } }),
			request({ shape: { kind: 'spherePlate', radiusUm: 51 } }),
			request({ medium: { permittivity: { kind: 'constant', value: 1 } } }),
			request({ right: { substrate: { version: 'gold-drude@1.0', zeroFrequency: 'drude' } } }),
			request({ right: { substrate: { permittivity: gold, permeability: { kind: 'constant', value: 2 } } } }),
			request({ right: { layers: [], substrate: { version: 'silica-constant@1.0' } } }),
			request({}, { separationsNm: [10, 20.000000000000004] }),
			request({}, { separationsNm: { from: 10, to: 20, count: 2, spacing: 'log' } }),
			request({}, { relativeAccuracy: 1e-7 }),
			request({}, { include: ['breakdown'] })
		].map(checksumOf);
		expect(new Set(changed).size).toBe(changed.length);
	});
});
