import { execFileSync, spawn } from 'node:child_process';
import { once } from 'node:events';
import { copyFileSync, mkdirSync, mkdtempSync, rmSync, symlinkSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { BareServer } from './start';

const SAME_AS_WORDKEEP = ['package.json', 'svelte.config.js', 'vite.config.ts', 'tsconfig.json', 'src/app.html'];

/** Builds and serves a page of one heading, with the framework, the versions and the configuration of Wordkeep. */
export async function startEmptyPage(port: number): Promise<BareServer> {
	const folder = mkdtempSync(join(tmpdir(), 'wordkeep-bench-empty-'));
	mkdirSync(join(folder, 'src', 'routes'), { recursive: true });
	for (const file of SAME_AS_WORDKEEP) copyFileSync(file, join(folder, file));
	symlinkSync(join(process.cwd(), 'node_modules'), join(folder, 'node_modules'));
	writeFileSync(join(folder, 'src', 'routes', '+page.svelte'), '<h1>Empty</h1>\n');
	const vite = join(folder, 'node_modules', 'vite', 'bin', 'vite.js');
	execFileSync(process.execPath, [vite, 'build', '--logLevel', 'error'], {
		cwd: folder,
		stdio: ['ignore', 'ignore', 'inherit']
	});
	const url = `http://localhost:${port}`;
	const child = spawn(process.execPath, ['build/index.js'], {
		cwd: folder,
		env: { ...process.env, PORT: String(port), ORIGIN: url },
		stdio: ['ignore', 'pipe', 'inherit']
	});
	await once(child.stdout, 'data');
	return {
		url,
		discard: async () => {
			child.kill();
			await once(child, 'exit');
			rmSync(folder, { recursive: true });
		}
	};
}
