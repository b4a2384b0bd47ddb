import { createHash } from 'node:crypto';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { run } from './run.js';

const ROOT = new URL('../..', import.meta.url);
const STAMP = new URL('node_modules/.wordkeep-lock', ROOT);

/** Says what went wrong in one line and ends. @param {string} reason @returns {never} */
export function giveUp(reason) {
	console.error(`\n${reason}`);
	process.exit(1);
}

export function checkNode() {
	const [major = 0, minor = 0] = process.versions.node.split('.').map(Number);
	if (major !== 20 || minor < 19) giveUp(`Wordkeep runs on Node.js 20.19 or later of 20; this is ${process.version}.`);
}

function lockHash() {
	return createHash('sha256')
		.update(readFileSync(new URL('package-lock.json', ROOT)))
		.digest('hex');
}

export function isInstalled() {
	return existsSync(STAMP) && readFileSync(STAMP, 'utf8') === lockHash();
}

/**
 * Installs the packages of the lock file, unless they are there. The database driver is compiled apart, so that other
 * work can go on meanwhile.
 *
 * @returns {Promise<{ driver: Promise<void> }>} once everything but the driver is there
 */
export async function install() {
	checkNode();
	if (isInstalled()) return { driver: Promise.resolve() };
	console.log('Installing packages ...');
	const { code } = await run('npm', ['ci', '--ignore-scripts', '--no-audit', '--no-fund']);
	if (code !== 0) giveUp('The packages could not be installed: see above.');
	return { driver: buildDriver() };
}

async function buildDriver() {
	console.log('Building the database driver (about two minutes where it must be compiled) ...');
	const { code, output } = await run('npm', ['rebuild', 'better-sqlite3'], { quiet: true });
	if (code !== 0) {
		await installByApt(['build-essential', 'python3'], 'a compiler for the database driver');
		const again = await run('npm', ['rebuild', 'better-sqlite3'], { quiet: true });
		if (again.code !== 0) giveUp(`The database driver could not be built:\n${output}`);
	}
	writeFileSync(STAMP, lockHash());
}

/**
 * Installs Debian packages where this process may, else names the one command to run and ends.
 *
 * @param {string[]} packages
 * @param {string} what what they are for
 */
export async function installByApt(packages, what) {
	const command = `apt-get update && apt-get install -y --no-install-recommends ${packages.join(' ')}`;
	const mayInstall = process.getuid?.() === 0 && existsSync('/usr/bin/apt-get');
	if (!mayInstall) giveUp(`Missing: ${what}. Run this once, then start again:\n\n    sudo sh -c '${command}'`);
	console.log(`Installing ${what} ...`);
	const { code } = await run('sh', ['-c', command], { quiet: true, env: { DEBIAN_FRONTEND: 'noninteractive' } });
	if (code !== 0) giveUp(`Could not install ${what}. Run this by hand, then start again:\n\n    ${command}`);
}
