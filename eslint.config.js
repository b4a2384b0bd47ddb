import js from '@eslint/js';
import prettier from 'eslint-config-prettier';
import svelte from 'eslint-plugin-svelte';
import globals from 'globals';
import { defineConfig, includeIgnoreFile } from 'eslint/config';
import { fileURLToPath } from 'node:url';
import ts from 'typescript-eslint';
import svelteConfig from './svelte.config.js';

/** Dependencies point one way: routes -> components, live, server -> stimuli -> mapping. */
const layers = {
	mapping: ['stimuli', 'live', 'server', 'components'],
	stimuli: ['live', 'server', 'components'],
	live: ['server', 'components'],
	server: ['live', 'components'],
	components: ['live', 'server']
};

function layerRule(layer, forbidden) {
	const outside = layer === 'mapping' ? ['svelte', 'svelte/**', '$app/**', '$env/**', 'node:*', 'zod', 'knex'] : [];
	return {
		files: [`src/lib/${layer}/**`],
		rules: {
			'no-restricted-imports': [
				'error',
				{
					patterns: [
						{
							group: [
								...forbidden.flatMap((other) => [
									`$lib/${other}`,
									`$lib/${other}/**`,
									`**/lib/${other}/**`,
									`../${other}/**`
								]),
								'**/routes/**',
								...outside
							],
							message: `src/lib/${layer} may not depend on this: see the import rule in DEVELOPERS.md.`
						}
					]
				}
			]
		}
	};
}

export default defineConfig(
	includeIgnoreFile(fileURLToPath(new URL('./.gitignore', import.meta.url))),
	js.configs.recommended,
	ts.configs.recommended,
	svelte.configs.recommended,
	prettier,
	svelte.configs.prettier,
	{
		languageOptions: { globals: { ...globals.browser, ...globals.node } },
		// Wordkeep is served at the root of its address: a path needs no base put before it.
		rules: { 'no-undef': 'off', 'svelte/no-navigation-without-resolve': 'off' }
	},
	{
		files: ['**/*.ts', '**/*.svelte'],
		languageOptions: {
			parserOptions: {
				projectService: true,
				tsconfigRootDir: import.meta.dirname,
				extraFileExtensions: ['.svelte'],
				parser: ts.parser,
				svelteConfig
			}
		},
		rules: {
			'@typescript-eslint/no-floating-promises': 'error',
			'@typescript-eslint/await-thenable': 'error'
		}
	},
	...Object.entries(layers).map(([layer, forbidden]) => layerRule(layer, forbidden)),
	{
		// The trade's rules have no clock and no chance of their own.
		files: ['src/lib/mapping/**'],
		rules: {
			'no-restricted-properties': [
				'error',
				{ object: 'Date', property: 'now' },
				{ object: 'Math', property: 'random' },
				{ object: 'performance', property: 'now' }
			],
			'no-restricted-globals': ['error', 'fetch', 'window', 'document', 'crypto', 'performance']
		}
	}
);
