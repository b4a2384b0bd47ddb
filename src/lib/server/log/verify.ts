import type { Knex } from 'knex';
import type { CaseLogRow } from '../tables';
import { chainHash, FIRST_PREVIOUS } from './chain';

export type ChainReport =
	| { code: string; ok: true; entries: number; head: string }
	| { code: string; ok: false; position: number; fault: string };

/** Verifies the chain of every case, or of one, and names the first row of each that is not as it was written. */
export async function verifyChains(db: Knex, only?: string): Promise<ChainReport[]> {
	const codes = await db<{ code: string }>('cases')
		.modify((query) => (only === undefined ? query : query.where({ code: only })))
		.orderBy('code')
		.pluck('code');
	const reports: ChainReport[] = [];
	for (const code of codes) reports.push(await verifyChain(db, code));
	return reports;
}

async function verifyChain(db: Knex, code: string): Promise<ChainReport> {
	const rows = await db<CaseLogRow>('case_log').where({ case_code: code }).orderBy('position');
	let previous = FIRST_PREVIOUS;
	for (const [index, row] of rows.entries()) {
		const fault = faultOfRow(row, index + 1, previous);
		if (fault) return { code, ok: false, position: row.position, fault };
		previous = row.hash;
	}
	return { code, ok: true, entries: rows.length, head: previous };
}

function faultOfRow(row: CaseLogRow, expected: number, previous: string): string | null {
	if (row.position !== expected) return `entry ${expected} is missing`;
	let event: unknown;
	try {
		event = JSON.parse(row.event);
	} catch {
		return `entry ${expected} is not readable`;
	}
	if ((event as { id?: string } | null)?.id !== row.id) return `entry ${expected} does not carry its own id`;
	const hash = chainHash(previous, {
		case: row.case_code,
		position: row.position,
		receivedAt: row.received_at,
		sender: row.sender,
		event
	});
	return hash === row.hash ? null : `entry ${expected} is not as it was written`;
}
