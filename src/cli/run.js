import { spawn } from 'node:child_process';

/**
 * Runs a command in the project's folder and shows what it prints.
 *
 * @param {string} command
 * @param {string[]} args
 * @param {{ env?: Record<string, string>, quiet?: boolean }} [options] `quiet` keeps the output for the result alone
 * @returns {Promise<{ code: number, output: string }>}
 */
export async function run(command, args, { env = {}, quiet = false } = {}) {
	const child = spawn(command, args, {
		cwd: new URL('../..', import.meta.url),
		env: { ...process.env, PLAYWRIGHT_SKIP_BROWSER_DOWNLOAD: '1', ...env },
		stdio: ['ignore', 'pipe', 'pipe']
	});
	let output = '';
	for (const stream of [child.stdout, child.stderr]) {
		stream.on('data', (chunk) => {
			output += chunk;
			if (!quiet) process.stdout.write(chunk);
		});
	}
	const code = await new Promise((done) => {
		child.on('error', (error) => {
			output += String(error);
			done(127);
		});
		child.on('close', (status) => done(status ?? 1));
	});
	return { code, output };
}
