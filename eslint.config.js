import js from '@eslint/js';
import prettier from 'eslint-config-prettier';
import svelte from 'eslint-plugin-svelte';
import globals from 'globals';
import ts from 'typescript-eslint';
import svelteConfig from './svelte.config.js';

/**
 * Who may import whom (DEVELOPERS.md): routes -> server -> schemas -> engine -> numerics; routes -> components -> format.
 * Each entry lists what files of a folder may not import; `import type` counts too.
 */
const boundaries = [
	{
		files: ['src/lib/engine/numerics/**'],
		ignores: ['**/*.test.ts'],
		forbid: [
			[
				'^\\.\\./(?!result)',
				'numerics knows no physics: it imports nothing outside itself but engine/result.ts'
			],
			['^(node:|\\$)', 'the engine is pure: no node modules, no framework']
		]
	},
	{
		files: ['src/lib/engine/**'],
		ignores: ['**/*.test.ts', 'src/lib/engine/numerics/**'],
		forbid: [
			['^node:', 'the engine is pure: no node modules'],
			['^\\$', 'the engine uses relative imports and knows neither framework nor server'],
			['(^|/)(server|schemas|components|format|routes)(/|$)', 'the engine imports nothing above it'],
			['^(postgres|drizzle-orm|pino|piscina)', 'the engine does no input or output']
		]
	},
	{
		files: ['src/lib/schemas/**'],
		ignores: ['**/*.test.ts'],
		forbid: [
			['^\\$app|^\\$env', 'schemas know no framework'],
			['(^|/)(server|components|routes)(/|$)', 'schemas import nothing above them']
		]
	},
	{
		files: ['src/lib/format/**'],
		ignores: ['**/*.test.ts'],
		forbid: [['(^|/)(server|components|routes)(/|$)', 'format serves both sides and imports neither']]
	},
	{
		files: ['src/lib/study-sheet/**', 'src/lib/screening/**'],
		ignores: ['**/*.test.ts'],
		forbid: [
			['(^|/)(server|components|routes)(/|$)', 'what page and server share imports neither'],
			['^\\$app|^\\$env|^svelte', 'what page and server share knows no framework']
		]
	},
	{
		files: ['src/lib/components/**'],
		ignores: ['**/*.test.ts'],
		forbid: [
			['(^|/)server(/|$)', 'components get their data as props'],
			[
				'engine/(lifshitz|reflection|analysis|shapes)',
				'components may use small evaluators only, never the sums and integrals'
			]
		]
	},
	{
		files: ['src/lib/server/**'],
		ignores: ['**/*.test.ts'],
		forbid: [
			['^\\$app|^\\$env|^@sveltejs/kit', 'services run in workers too: no framework'],
			['(^|/)(routes|components)(/|$)', 'services know neither routes nor components']
		]
	},
	{
		files: ['src/lib/server/compute/task.ts'],
		forbid: [
			['^\\$app|^\\$env|^@sveltejs/kit', 'services run in workers too: no framework'],
			['(^|/)db(/|$)|^postgres$|^drizzle-orm', 'the thread never talks to the database']
		]
	},
	{
		files: ['src/routes/**'],
		ignores: ['**/*.test.ts'],
		forbid: [
			['server/db(/|$)|^postgres$|^drizzle-orm', 'routes call services, never the database'],
			['routes/', "routes do not import another route's files"]
		]
	}
];

export default ts.config(
	{ ignores: ['build/', '.svelte-kit/', '.hairsbreadth/', 'drizzle/', 'test-results/', 'coverage/'] },
	js.configs.recommended,
	...ts.configs.recommended,
	...svelte.configs.recommended,
	prettier,
	...svelte.configs.prettier,
	{
		languageOptions: { globals: { ...globals.browser, ...globals.node } },
		rules: {
			'no-undef': 'off',
			'@typescript-eslint/no-explicit-any': 'error',
			'@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }],
			eqeqeq: ['error', 'smart'],
			// Addresses with a query are built by pure functions beside the pages, which the rule cannot follow.
			'svelte/no-navigation-without-resolve': ['error', { ignoreLinks: true }]
		}
	},
	{
		files: ['**/*.svelte', '**/*.svelte.ts'],
		languageOptions: {
			parserOptions: {
				projectService: true,
				extraFileExtensions: ['.svelte'],
				parser: ts.parser,
				svelteConfig
			}
		}
	},
	...boundaries.map(({ files, ignores, forbid }) => ({
		files,
		ignores: ignores ?? [],
		rules: {
			'no-restricted-imports': ['error', { patterns: forbid.map(([regex, message]) => ({ regex, message })) }]
		}
	}))
);
