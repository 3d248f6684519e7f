import { describe, expect, it } from 'vitest';
import { libraryQuery } from '$lib/schemas/material.ts';
import { decodeView } from './decode-view.ts';
import { sortedBy, USUAL_VIEW, viewQuery } from './library-address.ts';

const decoded = (query: string) => decodeView(new URLSearchParams(query));

describe('the address of the library page', () => {
	it('is empty for what is shown first', () => {
		const { view, problems } = decoded('');
		expect(problems).toEqual([]);
		expect(view.at).toBe(100);
		expect(viewQuery(view)).toBe('');
	});

	it('means by nothing what the schema means by nothing', () => {
		expect(USUAL_VIEW).toEqual({ ...libraryQuery.parse({}), at: 100 });
	});

	it('gives the same view back after a round trip', () => {
		const query =
			'?search=john+1972&class=metal&quality=checked&coversEv=0.5&sort=source&direction=descending&withoutData=1&at=38';
		const { view, problems } = decoded(query);
		expect(problems).toEqual([]);
		expect(viewQuery(view)).toBe(query);
		expect(decoded(viewQuery(view)).view).toEqual(view);
	});

	it('treats empty fields of a submitted form as no wish', () => {
		const { view, problems } = decoded('search=&class=&quality=&coversEv=');
		expect(problems).toEqual([]);
		expect(viewQuery(view)).toBe('');
	});

	it('reads a decimal comma', () => {
		expect(decoded('coversEv=0,5').view.coversEv).toBe(0.5);
	});

	it.each([
		['class=steel', 'class'],
		['quality=good', 'quality'],
		['coversEv=-1', 'coversEv'],
		['coversEv=abc', 'coversEv'],
		['sort=colour', 'sort'],
		['direction=up', 'direction'],
		['limit=100000', 'limit'],
		['at=-4', 'at'],
		['at=wide', 'at'],
		[`search=${'x'.repeat(300)}`, 'search']
	])('tells what is wrong with %s and shows the rest', (query, field) => {
		const { view, problems } = decoded(`${query}&withoutData=1`);
		expect(problems.map((problem) => problem.field)).toEqual([field]);
		expect(problems[0].message).toContain(field);
		expect(viewQuery(view)).toBe('?withoutData=1');
	});

	it('holds the hairline inside its range', () => {
		expect(decoded('at=0.001').view.at).toBe(1);
		expect(decoded('at=1e9').view.at).toBe(90_000);
	});

	it('goes back to the first page when anything else changes', () => {
		const { view } = decoded('cursor=abc&class=liquid');
		expect(viewQuery(view, { class: 'metal' })).toBe('?class=metal');
		expect(viewQuery(view, { cursor: 'def' })).toBe('?class=liquid&cursor=def');
	});

	it('turns the order round on the second press of a column', () => {
		expect(sortedBy(decoded('').view, 'source')).toBe('?sort=source');
		expect(sortedBy(decoded('sort=source').view, 'source')).toBe('?sort=source&direction=descending');
		expect(sortedBy(decoded('').view, 'material')).toBe('?direction=descending');
		expect(sortedBy(decoded('sort=source&direction=descending').view, 'static')).toBe('?sort=static');
	});
});
