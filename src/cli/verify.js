import { existsSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { build } from './build.js';
import { install, installByApt } from './install.js';
import { run } from './run.js';

/**
 * Installs what is missing and passes every check and test; the last line counts them. It never skips: what cannot
 * be installed is named, and that is a failure.
 */

const CHROMIUM = process.env.CHROMIUM ?? '/usr/bin/chromium';
const results = tmpdir();

let passed = 0;
let failed = 0;

/** @param {string} name @param {string} command @param {string[]} args */
async function check(name, command, args) {
	const { code, output } = await run(command, args, { quiet: true });
	report(name, code === 0, output);
}

/** @param {string} name @param {boolean} fine @param {string} output */
function report(name, fine, output) {
	if (fine) passed++;
	else failed++;
	console.log(`${fine ? 'passed' : 'FAILED'}: ${name}${fine ? '' : `\n${output}`}`);
}

/**
 * Runs a test runner that leaves its counts in a JSON file; a runner that did not get as far as counting has failed.
 *
 * @param {string} name
 * @param {string[]} args
 * @param {Record<string, string>} env
 * @param {string} file
 * @param {(report: any) => { passed: number, failed: number }} counts
 */
async function test(name, args, env, file, counts) {
	rmSync(file, { force: true });
	const { code } = await run('npx', args, { env });
	const found = existsSync(file) ? counts(JSON.parse(readFileSync(file, 'utf8'))) : { passed: 0, failed: 0 };
	passed += found.passed;
	failed += found.failed;
	if (code !== 0 && found.failed === 0) report(name, false, 'the runner ended with an error: see above');
	if (code === 0 && found.passed === 0) report(name, false, 'no test was run');
}

/** Names of the tests that passed at a second try only. @param {any[]} suites @returns {string[]} */
function flaky(suites) {
	return suites.flatMap(({ suites: inner = [], specs = [] }) => [
		...flaky(inner),
		...specs
			.filter((/** @type {any} */ spec) => spec.tests.some((/** @type {any} */ one) => one.status === 'flaky'))
			.map((/** @type {any} */ spec) => `${spec.file}: ${spec.title}`)
	]);
}

const { driver } = await install();
if (!existsSync(CHROMIUM)) await installByApt(['chromium'], 'Chromium for the browser tests');

await run('npx', ['svelte-kit', 'sync'], { quiet: true });
await check('format', 'npx', ['prettier', '--check', '.']);
await check('lint', 'npx', ['eslint', '.']);
await check('types', 'npm', ['run', '--silent', 'check']);
await driver;
await build();
report('build', true, '');

const vitest = join(results, 'wordkeep-vitest.json');
await test(
	'vitest',
	['vitest', 'run', '--reporter=default', '--reporter=json', `--outputFile.json=${vitest}`],
	{},
	vitest,
	(report) => ({
		passed: report.numPassedTests,
		failed: report.numFailedTests + report.numPendingTests + report.numTodoTests
	})
);

const playwright = join(results, 'wordkeep-playwright.json');
await test(
	'playwright',
	['playwright', 'test', '--reporter=list,json'],
	{ PLAYWRIGHT_JSON_OUTPUT_NAME: playwright, CHROMIUM },
	playwright,
	({ stats, suites }) => {
		for (const name of flaky(suites)) console.log(`passed at the second try, to be mended: ${name}`);
		return { passed: stats.expected + stats.flaky, failed: stats.unexpected + stats.skipped };
	}
);

console.log(`\n${passed} passed, ${failed} failed`);
process.exit(failed === 0 ? 0 : 1);
