import { readFileSync, readdirSync } from 'node:fs';
import { dirname, join, relative } from 'node:path';
import { describe, expect, it } from 'vitest';
import { callOf, POLICY, whoMay, withoutGroups, type Call, type Method } from './policy.ts';

const ROUTES = 'src/routes';
const METHODS: Method[] = ['GET', 'POST', 'PUT', 'PATCH', 'DELETE'];

/** What each route file answers to, read from its exports. */
function callsOf(file: string, text: string): Call[] {
	if (/\+page(\.server)?\.(svelte|ts)$/.test(file)) {
		const actions = /export const actions\b[^{]*\{\n([\s\S]*?)\n\}/.exec(text)?.[1] ?? '';
		const names = [...actions.matchAll(/^\t(?:async )?(\w+)(?=[:(,]|$)/gm)].map(([, name]) => name);
		return ['GET', ...names.map((name) => (name === 'default' ? 'POST' : (`?/${name}` as const)))];
	}
	return METHODS.filter((method) =>
		new RegExp(`export (const|async function|function) ${method}\\b`).test(text)
	);
}

function routes(): Map<string, Set<Call>> {
	const found = new Map<string, Set<Call>>();
	const files = readdirSync(ROUTES, { recursive: true, withFileTypes: true })
		.filter((entry) => entry.isFile() && /^\+(page\.svelte|page(\.server)?\.ts|server\.ts)$/.test(entry.name))
		.map((entry) => join(entry.parentPath, entry.name));
	for (const file of files) {
		const id = withoutGroups(`/${relative(ROUTES, dirname(file))}`);
		const methods = found.get(id) ?? new Set<Call>();
		for (const call of callsOf(file, readFileSync(file, 'utf8'))) methods.add(call);
		found.set(id, methods);
	}
	return found;
}

describe('the policy table', () => {
	const found = routes();

	it('has routes to speak about', () => {
		expect(found.size).toBeGreaterThan(5);
	});

	it('has a word for every method of every route', () => {
		const silent = [...found].flatMap(([id, methods]) =>
			[...methods].filter((method) => !whoMay(id, method)).map((method) => `${method} ${id}`)
		);
		expect(silent).toEqual([]);
	});

	it('speaks of no route or method that does not exist', () => {
		const idle = Object.entries(POLICY).flatMap(([id, row]) =>
			(Object.keys(row) as Call[])
				.filter((method) => !found.get(id)?.has(method))
				.map((method) => `${method} ${id}`)
		);
		expect(idle).toEqual([]);
	});
});

describe('whoMay', () => {
	it.each([
		['/(library)/materials/[slug]', 'GET', 'readers'],
		['/api/v1/forces', 'POST', 'computing'],
		['/(auth)/sign-in', '?/link', 'everyone'],
		['/library', 'HEAD', 'readers'],
		['/api/v1/forces', 'OPTIONS', 'everyone']
	])('lets %s be called with %s', (route, method, who) => {
		expect(whoMay(route, method)).toBe(who);
	});

	it.each([
		['/library', 'POST'],
		['/api/v1/forces', 'GET'],
		['/api/v1/forces', 'DELETE'],
		['/not/in/the/table', 'GET'],
		['/constructor', 'GET'],
		['/library', 'TRACE'],
		['/sign-in', 'POST'],
		['/sign-in', '?/nothing'],
		['/sign-in', 'hasOwnProperty']
	])('answers %s with %s to nobody', (route, method) => {
		expect(whoMay(route, method)).toBeUndefined();
	});
});

describe('callOf', () => {
	it.each([
		['POST', '', 'POST'],
		['POST', '?/revoke', '?/revoke'],
		['POST', '?x=1&/revoke&/other', '?/revoke'],
		['GET', '?/revoke', 'GET']
	])('takes %s %s for %s', (method, query, call) => {
		expect(callOf(method, new URLSearchParams(query))).toBe(call);
	});
});

describe('withoutGroups', () => {
	it('drops groups wherever they stand', () => {
		expect(withoutGroups('/(library)/materials/[slug]')).toBe('/materials/[slug]');
		expect(withoutGroups('/a/(b)/(c)/d')).toBe('/a/d');
		expect(withoutGroups('/(studies)')).toBe('/');
		expect(withoutGroups('/')).toBe('/');
	});
});
