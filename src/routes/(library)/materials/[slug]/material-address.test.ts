import { describe, expect, it } from 'vitest';
import { decodeMaterialView, materialQuery, usuallyDrawn } from './material-address.ts';

const slugs = ['gold-a', 'gold-b', 'gold-c', 'gold-d', 'gold-e', 'gold-f'];
const datasets = slugs.map((slug) => ({ slug, quality: 'checked' as const }));
const usual = slugs.slice(0, 5);
const decoded = (query: string) => decodeMaterialView(new URLSearchParams(query), datasets);

describe('the address of a material page', () => {
	it('is empty for what is shown first: the first five datasets, nothing compared', () => {
		const { view, problems } = decoded('');
		expect(problems).toEqual([]);
		expect(view).toEqual({ drawn: slugs.slice(0, 5), compared: null, at: 100 });
		expect(materialQuery(view, usual)).toBe('');
	});

	it('gives the same view back after a round trip', () => {
		const query = '?draw=gold-b&draw=gold-f&first=gold-b&second=gold-f&at=38';
		const { view, problems } = decoded(query);
		expect(problems).toEqual([]);
		expect(materialQuery(view, usual)).toBe(query);
	});

	it('keeps the order of the list, whatever the order of the address', () => {
		expect(decoded('draw=gold-c&draw=gold-a').view.drawn).toEqual(['gold-a', 'gold-c']);
	});

	it.each([
		['draw=silver', 'silver'],
		['first=gold-a&second=gold-a', 'two different'],
		['first=gold-a', 'two different'],
		['first=gold-a&second=silver', 'two different'],
		['at=far', 'far'],
		[slugs.map((slug) => `draw=${slug}`).join('&'), 'At most 5']
	])('says what it left out of %s', (query, word) => {
		const { problems, view } = decoded(query);
		expect(problems.join(' ')).toContain(word);
		expect(view.drawn.length).toBeGreaterThan(0);
		expect(view.drawn.length).toBeLessThanOrEqual(5);
		expect(view.compared).toBeNull();
		expect(view.at).toBe(100);
	});

	it('takes a form with empty selections as no comparison', () => {
		expect(decoded('first=&second=')).toMatchObject({ problems: [], view: { compared: null } });
	});

	it('draws checked data before provisional ones, in the order of the list', () => {
		const mixed = datasets.map((dataset, index) => ({
			...dataset,
			quality: index < 2 ? ('provisional' as const) : ('checked' as const)
		}));
		expect(usuallyDrawn(mixed)).toEqual(['gold-a', 'gold-c', 'gold-d', 'gold-e', 'gold-f']);
		expect(usuallyDrawn([])).toEqual([]);
	});

	it('has nothing to draw for a material without data', () => {
		expect(decodeMaterialView(new URLSearchParams(), []).view.drawn).toEqual([]);
	});
});
