import { existsSync } from 'node:fs';
import { join } from 'node:path';
import { parseArgs } from 'node:util';
import knexModule from 'knex';
import config, { DATA_DIR } from '../../knexfile';
import { verifyChains, type ChainReport } from '../lib/server/log/verify';

/**
 * Verifies the case log of every case, or of one, and prints a line for each: how many entries and the check code of
 * the last one, or the first entry that is damaged. Nothing is written.
 *
 * @returns whether all are whole
 */
async function audit(only: string | undefined): Promise<boolean> {
	const filename = join(DATA_DIR, 'wordkeep.db');
	if (!existsSync(filename)) throw new Error(`there is no ${filename}; say where the data are with DATA_DIR`);
	const db = knexModule({
		client: config.client as string,
		connection: { filename, options: { readonly: true } },
		useNullAsDefault: true
	});
	try {
		const reports = await verifyChains(db, only);
		if (only !== undefined && reports.length === 0) throw new Error(`there is no case ${only}`);
		for (const report of reports) console.log(lineOf(report));
		return reports.every(({ ok }) => ok);
	} finally {
		await db.destroy();
	}
}

function lineOf(report: ChainReport): string {
	if (!report.ok) return `${report.code}  damaged at entry ${report.position}: ${report.fault}`;
	return `${report.code}  ${report.entries} entries  check code ${report.head}`;
}

try {
	const { values } = parseArgs({ options: { case: { type: 'string' } } });
	if (!(await audit(values.case))) process.exitCode = 1;
} catch (failure) {
	console.error(`The case log could not be verified: ${(failure as Error).message}`);
	process.exitCode = 1;
}
