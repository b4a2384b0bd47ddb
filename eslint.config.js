import js from '@eslint/js';
import prettier from 'eslint-config-prettier';
import svelte from 'eslint-plugin-svelte';
import globals from 'globals';
import { defineConfig, includeIgnoreFile } from 'eslint/config';
import { dirname, resolve, sep } from 'node:path';
import { fileURLToPath } from 'node:url';
import ts from 'typescript-eslint';
import svelteConfig from './svelte.config.js';

const LIB = fileURLToPath(new URL('./src/lib/', import.meta.url));

/** Dependencies point one way: routes -> components, live, server -> stimuli -> mapping; messages read mapping alone. */
const MAY_IMPORT = {
	mapping: [],
	messages: ['stimuli', 'mapping'],
	stimuli: ['mapping'],
	live: ['stimuli', 'mapping', 'messages'],
	server: ['stimuli', 'mapping', 'messages'],
	components: ['stimuli', 'mapping', 'messages']
};

/** The layer of a file or of what it imports; null outside src/lib's folders. */
function layerOf(path) {
	if (!path.startsWith(LIB)) return null;
	const [folder] = path.slice(LIB.length).split(/[\\/]/);
	return folder in MAY_IMPORT ? folder : null;
}

const layers = {
	meta: { type: 'problem', schema: [] },
	create(context) {
		const own = layerOf(context.filename);
		if (own === null) return {};
		const check = (node) => {
			const name = node.source?.value;
			if (typeof name !== 'string') return;
			const path = name.startsWith('$lib/')
				? resolve(LIB, name.slice('$lib/'.length))
				: name.startsWith('.')
					? resolve(dirname(context.filename), name)
					: null;
			const isRoute = path?.includes(`${sep}src${sep}routes${sep}`);
			const other = path === null ? null : layerOf(path);
			if (isRoute || (other !== null && other !== own && !MAY_IMPORT[own].includes(other))) {
				context.report({ node, message: `src/lib/${own} may not import this: see the import rule in DEVELOPERS.md.` });
			}
			if (own === 'mapping' && path === null) {
				context.report({ node, message: 'src/lib/mapping imports nothing but itself.' });
			}
		};
		return { ImportDeclaration: check, ExportNamedDeclaration: check, ExportAllDeclaration: check };
	}
};

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
			'@typescript-eslint/await-thenable': 'error',
			// State that is replaced whole is kept raw, maps included.
			'svelte/prefer-svelte-reactivity': 'off'
		}
	},
	{
		files: ['src/lib/**'],
		plugins: { wordkeep: { rules: { layers } } },
		rules: { 'wordkeep/layers': 'error' }
	},
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
