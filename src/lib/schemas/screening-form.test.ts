import { describe, expect, it } from 'vitest';
import { SCREENING_BEGIN, screeningFromForm } from './screening-form.ts';
import { newScreening } from './screening.ts';

const read = (over: Record<string, string> = {}) =>
	newScreening.safeParse(screeningFromForm({ ...SCREENING_BEGIN, name: 'A search', ...over }));

describe('the form of a screening', () => {
	it('begins with a statement that holds', () => {
		expect(read().data?.statement).toEqual({
			left: { class: 'solid' },
			medium: { class: 'liquid' },
			separationsNm: [20, 50, 100, 200, 500],
			temperatureK: 300,
			rules: ['written'],
			rivals: 'all',
			criterion: { kind: 'repulsive', fromNm: 50, toNm: 200 }
		});
	});

	it('reads units, lists, films and the own side', () => {
		const { data } = read({
			pairs: 'own',
			'right.versions': 'gold-drude@1.0, silica-two-oscillators@1.0',
			'left.coating.of': 'gold-drude@1.0',
			'left.coating.from': '2 nm',
			'left.coating.to': '0.1 um',
			'left.coating.count': '5',
			separationsNm: '2 um; 50 nm, 50',
			temperatureK: '77 300',
			rules: 'drude plasma',
			'criterion.kind': 'below',
			'criterion.pressurePa': '10'
		});
		expect(data?.statement).toMatchObject({
			right: { versions: ['gold-drude@1.0', 'silica-two-oscillators@1.0'] },
			left: { coating: { of: 'gold-drude@1.0', thicknessNm: { from: 2, to: 100, count: 5 } } },
			separationsNm: [50, 2000],
			temperatureK: [77, 300],
			rules: ['drude', 'plasma'],
			criterion: { kind: 'below', pressurePa: 10 }
		});
	});

	it('names the field of what cannot be read', () => {
		const paths = (over: Record<string, string>) =>
			read(over).error?.issues.map(({ path }) => path.join('.'));
		expect(paths({ separationsNm: '50 nm, near' })).toEqual(['statement.separationsNm.1']);
		expect(paths({ name: '' })).toEqual(['name']);
		expect(paths({ 'criterion.kind': 'below' })?.[0]).toBe('statement.criterion.pressurePa');
	});
});
