import { existsSync, readdirSync, statSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { giveUp } from './install.js';
import { run } from './run.js';

const ROOT = fileURLToPath(new URL('../..', import.meta.url));
const BUILT = join(ROOT, 'build', 'handler.js');
const SOURCES = [
	'src',
	'static',
	'stimuli',
	'migrations',
	'knexfile.ts',
	'package-lock.json',
	'svelte.config.js',
	'tailwind.config.ts',
	'vite.config.ts'
];

/** Builds media and application, unless nothing has changed since. */
export async function build() {
	if (isBuilt()) return;
	console.log('Building ...');
	for (const script of ['media', 'build:app']) {
		// Whatever called, the tests for one: with another value the scripts of development would be built in.
		const env = { NODE_ENV: 'production' };
		const { code, output } = await run('npm', ['run', '--silent', script], { env, quiet: script === 'build:app' });
		if (code !== 0) giveUp(`The build failed:\n${output}`);
	}
}

function isBuilt() {
	if (!existsSync(BUILT) || !existsSync(join(ROOT, '.media', 'catalogue.json'))) return false;
	const built = statSync(BUILT).mtimeMs;
	return SOURCES.every((source) => newest(join(ROOT, source)) <= built);
}

/** Latest change of a file, or of any file in a folder. @param {string} path @returns {number} */
function newest(path) {
	const found = statSync(path);
	if (!found.isDirectory()) return found.mtimeMs;
	return Math.max(0, ...readdirSync(path).map((name) => newest(join(path, name))));
}
