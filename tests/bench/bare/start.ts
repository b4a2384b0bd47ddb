import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

export interface BareServer {
	url: string;
	/** Ends it, its data with it. */
	discard(): Promise<void>;
}

/** Starts one of the bare servers in a process of its own, as Wordkeep has one, and waits until it listens. */
export async function startBare(
	name: 'insert-server' | 'push-server',
	port: number,
	env: Record<string, string> = {}
): Promise<BareServer> {
	const dataDir = mkdtempSync(join(tmpdir(), 'wordkeep-bench-bare-'));
	const script = fileURLToPath(new URL(`./${name}.ts`, import.meta.url));
	const child = spawn(process.execPath, ['--import', 'tsx', script], {
		env: { ...process.env, ...env, NODE_ENV: 'production', DATA_DIR: dataDir, PORT: String(port) },
		stdio: ['ignore', 'pipe', 'inherit']
	});
	await Promise.race([
		once(child.stdout, 'data'),
		once(child, 'exit').then(([code]) => Promise.reject(new Error(`${name} ended with ${code}`)))
	]);
	return {
		url: `http://localhost:${port}`,
		discard: async () => {
			child.kill();
			await once(child, 'exit');
			rmSync(dataDir, { recursive: true });
		}
	};
}
