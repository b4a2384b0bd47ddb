import { readFile } from 'node:fs/promises';
import { createRequire } from 'node:module';
import { join } from 'node:path';

const require = createRequire(import.meta.url);

const versions = new Map<string, Promise<string>>();

/**
 * `name@version` of an installed package, read beside it: not every package lets its package.json be imported.
 * @throws Error when it is not installed
 */
export function installedVersion(name: string): Promise<string> {
	const version = versions.get(name) ?? findVersion(name);
	versions.set(name, version);
	return version;
}

async function findVersion(name: string): Promise<string> {
	for (const folder of require.resolve.paths(name) ?? []) {
		const text = await readFile(join(folder, name, 'package.json'), 'utf8').catch(() => null);
		if (text !== null) return `${name}@${(JSON.parse(text) as { version: string }).version}`;
	}
	throw new Error(`the package ${name} is not installed`);
}
