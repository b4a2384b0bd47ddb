import { sveltekit } from '@sveltejs/kit/vite';
import { svelte, vitePreprocess } from '@sveltejs/vite-plugin-svelte';
import tailwindcss from '@tailwindcss/vite';
import { defineConfig } from 'vitest/config';

export default defineConfig({
	plugins: [tailwindcss(), sveltekit()],
	// The patient view's script is built apart, as workers are, so that it shares no chunk with the staff's pages.
	worker: {
		format: 'es',
		plugins: () => [
			svelte({ configFile: false, preprocess: vitePreprocess(), compilerOptions: { css: 'injected', runes: true } })
		]
	},
	test: {
		environment: 'node',
		env: { DATA_DIR: ':memory:' },
		pool: 'forks',
		expect: { requireAssertions: true },
		testTimeout: 30_000,
		hookTimeout: 60_000,
		projects: [
			{ extends: true, test: { name: 'rules', include: ['tests/{unit,reference}/**/*.test.ts'] } },
			{
				extends: true,
				test: { name: 'api', include: ['tests/api/**/*.test.ts'], globalSetup: ['tests/api/build.ts'] }
			}
		]
	}
});
