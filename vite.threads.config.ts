import { fileURLToPath } from 'node:url';
import { defineConfig } from 'vite';

/** Bundles what runs in worker threads and in worker processes; after the application's own build, because the adapter empties build/. */
export default defineConfig({
	publicDir: false,
	resolve: { alias: { $lib: fileURLToPath(new URL('./src/lib', import.meta.url)) } },
	build: {
		ssr: true,
		outDir: 'build/threads',
		emptyOutDir: true,
		rollupOptions: {
			input: { 'engine-task': 'src/lib/server/compute/task.ts', worker: 'src/worker/main.ts' },
			output: { format: 'es', entryFileNames: '[name].js' }
		}
	}
});
