import type { Knex } from 'knex';
import type { CaseLogRow } from '../tables';
import { chainHash, FIRST_PREVIOUS } from './chain';

export type ChainReport =
	| { code: string; ok: true; entries: number; head: string }
	| { code: string; ok: false; position: number; fault: string };

/** Verifies the chain of every case, or of one, and names the first row of each that is not as it was written. */
export async function verifyChains(db: Knex, only?: string): Promise<ChainReport[]> {
	const reports: ChainReport[] = [];
	for (const code of await codesIn(db)) {
		if (only === undefined || only === code) reports.push(await verifyChain(db, code));
	}
	return reports;
}

/** Every case, one whose own row was taken away included. */
async function codesIn(db: Knex): Promise<string[]> {
	const rows = await db<{ code: string }>('cases')
		.select('code')
		.union(db('case_log').select('case_code as code'))
		.orderBy('code');
	return rows.map(({ code }) => code);
}

async function verifyChain(db: Knex, code: string): Promise<ChainReport> {
	const rows = await db<CaseLogRow>('case_log').where({ case_code: code }).orderBy('position');
	let previous = FIRST_PREVIOUS;
	for (const [index, row] of rows.entries()) {
		const fault = faultOfRow(row, index + 1, previous);
		if (fault) return { code, ok: false, position: index + 1, fault };
		previous = row.hash;
	}
	return { code, ok: true, entries: rows.length, head: previous };
}

function faultOfRow(row: CaseLogRow, expected: number, previous: string): string | null {
	if (row.position !== expected) return 'it is missing';
	let event: unknown;
	try {
		event = JSON.parse(row.event);
	} catch {
		return 'it is not readable';
	}
	if ((event as { id?: string } | null)?.id !== row.id) return 'it does not carry its own id';
	const hash = chainHash(previous, {
		case: row.case_code,
		position: row.position,
		receivedAt: row.received_at,
		sender: row.sender,
		event
	});
	return hash === row.hash ? null : 'it is not as it was written, or the one before it was replaced';
}
