import { sveltekit } from '@sveltejs/kit/vite';
import tailwindcss from '@tailwindcss/vite';
import { defineConfig } from 'vitest/config';

export default defineConfig({
	plugins: [tailwindcss(), sveltekit()],
	test: {
		include: ['tests/{unit,reference,api}/**/*.test.ts'],
		environment: 'node',
		env: { DATA_DIR: ':memory:' },
		pool: 'forks',
		expect: { requireAssertions: true },
		testTimeout: 30_000,
		hookTimeout: 60_000
	}
});
