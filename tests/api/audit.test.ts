import { execFile } from 'node:child_process';
import { createHash } from 'node:crypto';
import { cpSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { promisify } from 'node:util';
import Database from 'better-sqlite3';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { canonical, type Stored } from './canonical';
import { newCase, trials } from './entries';
import { startServer, team, type Server } from './server';

interface Row {
	case_code: string;
	position: number;
	id: string;
	received_at: string;
	sender: string;
	event: string;
	hash: string;
}

let server: Server;
/** two cases; the first is tampered with */
let codes: [string, string];
let logs: [Stored[], Stored[]];
const copies: string[] = [];

beforeAll(async () => {
	server = await startServer();
	const { examiner } = await team(server);
	const cases = [await newCase(examiner), await newCase(examiner)].sort();
	const read = [];
	for (const [index, code] of cases.entries()) {
		const events = trials(index === 0 ? ['anomia', 'intact', 'anomia', 'delay', 'intact'] : ['intact']);
		await examiner.client.post(`/api/cases/${code}/events`, { events });
		read.push((await examiner.client.get(`/api/cases/${code}/events`)).body.events as Stored[]);
	}
	[codes, logs] = [cases as typeof codes, read as typeof logs];
	await server.stop();
});
afterAll(async () => {
	for (const copy of copies) rmSync(copy, { recursive: true });
	await server.discard();
});

async function audit(dataDir: string, ...args: string[]): Promise<{ code: number; stdout: string; stderr: string }> {
	try {
		const options = { env: { ...process.env, DATA_DIR: dataDir } };
		// What npm run audit calls, without the second that npm itself takes.
		const command = ['--import', 'tsx', 'src/cli/audit.ts', ...args];
		return { code: 0, ...(await promisify(execFile)(process.execPath, command, options)) };
	} catch (failure) {
		return failure as { code: number; stdout: string; stderr: string };
	}
}

/** A copy of the data that somebody with access to the file has worked on: the triggers do not stop them. */
function tampered(work: (database: Database.Database) => void): string {
	const dataDir = mkdtempSync(join(tmpdir(), 'tampered-'));
	copies.push(dataDir);
	cpSync(server.dataDir, dataDir, { recursive: true });
	const database = new Database(join(dataDir, 'wordkeep.db'));
	database.pragma('foreign_keys = OFF');
	database.exec('DROP TRIGGER case_log_refuses_update; DROP TRIGGER case_log_refuses_delete');
	work(database);
	database.close();
	return dataDir;
}

function rowAt(database: Database.Database, position: number): Row {
	return database.prepare('SELECT * FROM case_log WHERE case_code = ? AND position = ?').get(codes[0], position) as Row;
}

function set(database: Database.Database, position: number, change: Partial<Row>): void {
	const columns = Object.keys(change);
	database
		.prepare(
			`UPDATE case_log SET ${columns.map((name) => `${name} = ?`).join(', ')} WHERE case_code = ? AND position = ?`
		)
		.run(...Object.values(change), codes[0], position);
}

const otherTag = (event: string) => event.replace('"tag":"7"', '"tag":"8"');

describe('npm run audit', () => {
	it('names every case with its entries and the check code of its last one', async () => {
		const before = readFileSync(join(server.dataDir, 'wordkeep.db'));
		expect(logs.map((log) => log.length)).toEqual([10, 2]);
		expect(await audit(server.dataDir)).toEqual({
			code: 0,
			stdout: codes
				.map((code, i) => `${code}  ${logs[i]?.length} entries  check code ${logs[i]?.at(-1)?.hash}\n`)
				.join(''),
			stderr: ''
		});
		expect(readFileSync(join(server.dataDir, 'wordkeep.db')).equals(before)).toBe(true);
	});

	it('verifies one case when it is named', async () => {
		const { code, stdout } = await audit(server.dataDir, '--case', codes[1]);
		expect(code).toBe(0);
		expect(stdout).toBe(`${codes[1]}  2 entries  check code ${logs[1].at(-1)?.hash}\n`);
	});

	it('fails for a case, a folder or an option that is not there', async () => {
		expect(await audit(server.dataDir, '--case', 'none')).toMatchObject({ code: 1, stdout: '' });
		const empty = mkdtempSync(join(tmpdir(), 'empty-'));
		copies.push(empty);
		const { code, stderr } = await audit(empty);
		expect(code).toBe(1);
		expect(stderr).toContain(join(empty, 'wordkeep.db'));
		expect(await audit(server.dataDir, '--other')).toMatchObject({ code: 1, stdout: '' });
	});

	it.each<[string, number, (database: Database.Database) => void]>([
		['a changed entry', 3, (db) => set(db, 3, { event: otherTag(rowAt(db, 3).event) })],
		['a changed last entry', 10, (db) => set(db, 10, { event: rowAt(db, 10).event.replace('intact', 'anomia') })],
		['a changed sender', 5, (db) => set(db, 5, { sender: 'somebody else' })],
		['a changed time', 4, (db) => set(db, 4, { received_at: '2031-01-01T00:00:00.000Z' })],
		['a changed hash', 6, (db) => set(db, 6, { hash: 'f'.repeat(64) })],
		['an entry that cannot be read', 2, (db) => set(db, 2, { event: '{' })],
		['an entry that is nothing', 2, (db) => set(db, 2, { event: 'null' })],
		['an id that is not the entry’s', 8, (db) => set(db, 8, { id: rowAt(db, 8).id.replace(/.$/, 'x') })],
		[
			'a deleted first row',
			1,
			(db) => db.prepare('DELETE FROM case_log WHERE case_code = ? AND position = 1').run(codes[0])
		],
		['a deleted row', 4, (db) => db.prepare('DELETE FROM case_log WHERE case_code = ? AND position = 4').run(codes[0])],
		[
			'a deleted row with those after it moved up',
			4,
			(db) => {
				db.prepare('DELETE FROM case_log WHERE case_code = ? AND position = 4').run(codes[0]);
				for (let at = 5; at <= 10; at++) set(db, at, { position: at - 1 });
			}
		],
		[
			'two rows in another order',
			3,
			(db) => {
				set(db, 3, { position: 99 });
				set(db, 5, { position: 3 });
				set(db, 99, { position: 5 });
			}
		],
		[
			'a row put in between',
			6,
			(db) => {
				for (let at = 10; at >= 6; at--) set(db, at, { position: at + 1 });
				const { id, ...row } = rowAt(db, 7);
				const event = row.event.replace(id, `${id.slice(0, -1)}0`);
				db.prepare('INSERT INTO case_log VALUES (?, 6, ?, ?, ?, ?, ?)').run(
					codes[0],
					`${id.slice(0, -1)}0`,
					row.received_at,
					row.sender,
					event,
					row.hash
				);
			}
		],
		[
			'the row of the case itself taken away',
			3,
			(db) => {
				set(db, 3, { event: otherTag(rowAt(db, 3).event) });
				db.prepare('DELETE FROM cases WHERE code = ?').run(codes[0]);
			}
		]
	])('names %s at its row, and the other case stays whole', async (_, position, work) => {
		const { code, stdout } = await audit(tampered(work));
		expect(code).toBe(1);
		const [damaged, whole] = stdout.split('\n');
		expect(damaged).toMatch(new RegExp(`^${codes[0]}  damaged at entry ${position}: `));
		expect(whole).toBe(`${codes[1]}  2 entries  check code ${logs[1].at(-1)?.hash}`);
	});

	it('finds a changed row whose own hash was worked out anew at the row after it, which no longer follows', async () => {
		const { code, stdout } = await audit(
			tampered((db) => {
				const { event: before, received_at, sender } = rowAt(db, 3);
				const event = otherTag(before);
				expect(event).not.toBe(before);
				const link = { case: codes[0], position: 3, receivedAt: received_at, sender, event: JSON.parse(event) };
				const hash = createHash('sha256')
					.update(rowAt(db, 2).hash + canonical(link))
					.digest('hex');
				set(db, 3, { event, hash });
			})
		);
		expect(code).toBe(1);
		expect(stdout).toContain(`${codes[0]}  damaged at entry 4: it is not as it was written, or the one before it was`);
	});
});
