import { execFileSync } from 'node:child_process';
import { readdirSync, statSync } from 'node:fs';
import { join } from 'node:path';

const SOURCES = ['src', 'migrations', 'static', 'knexfile.ts', 'svelte.config.js', 'vite.config.ts'];

/** Builds what the tests drive, unless the build at hand is younger than everything it is made of. */
export default function build(): void {
	const built = modified('build/handler.js');
	if (SOURCES.flatMap(filesIn).every((path) => modified(path) < built)) return;
	execFileSync('npm', ['run', 'build'], { stdio: ['ignore', 'ignore', 'inherit'] });
}

/** Milliseconds since the epoch; 0 for what is not there. */
function modified(path: string): number {
	return statSync(path, { throwIfNoEntry: false })?.mtimeMs ?? 0;
}

function filesIn(path: string): string[] {
	if (!statSync(path).isDirectory()) return [path];
	return readdirSync(path, { recursive: true, encoding: 'utf8' }).map((file) => join(path, file));
}
