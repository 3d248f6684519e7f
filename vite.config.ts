import tailwindcss from '@tailwindcss/vite';
import { sveltekit } from '@sveltejs/kit/vite';
import { svelteTesting } from '@testing-library/svelte/vite';
import { defineConfig } from 'vitest/config';

/** One process at a time for tests that share a database; the rest may run side by side. */
export default defineConfig({
	plugins: [tailwindcss(), sveltekit()],
	// Fonts and pictures stay files: the content security policy knows no data: fonts.
	build: { assetsInlineLimit: 0 },
	test: {
		projects: [
			{
				extends: true,
				test: {
					name: 'unit',
					environment: 'node',
					include: ['src/**/*.test.ts', 'tests/{reference,physics}/**/*.test.ts'],
					exclude: ['src/**/*.svelte.test.ts']
				}
			},
			{
				extends: true,
				plugins: [svelteTesting()],
				test: { name: 'component', environment: 'happy-dom', include: ['src/**/*.svelte.test.ts'] }
			},
			{
				extends: true,
				test: {
					name: 'database',
					environment: 'node',
					include: ['tests/{db,api,people,launch}/**/*.test.ts'],
					globalSetup: 'tests/support/database-server.ts',
					fileParallelism: false,
					testTimeout: 20_000
				}
			}
		]
	}
});
