import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import Database from 'better-sqlite3';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';

let folder = '';

/** The modules of a server that starts on the data in the folder. */
async function start() {
	vi.resetModules();
	vi.stubEnv('DATA_DIR', folder);
	const database = await import('../../../src/lib/server/database');
	const { append, IdTaken } = await import('../../../src/lib/server/log/log');
	await database.openDatabase();
	return { ...database, append, IdTaken };
}

type Started = Awaited<ReturnType<typeof start>>;

async function withCase({ db }: Started): Promise<void> {
	const account = { id: 'a', email: 'a@demo.invalid', name: 'A', roles: '[]', created_at: '2031-03-05T12:00:00Z' };
	await db('accounts').insert(account);
	const row = { code: 'tamu-rilo-38', hemisphere: 'left', languages: '["en"]', created_at: '2031-03-05T12:00:00Z' };
	await db('cases').insert({ ...row, created_by: 'a' });
}

const placed = (id: string, tag = '7') =>
	({ id, type: 'tag-placed', at: '2031-03-05T12:00:00Z', device: 'd', monotonic: 0, data: { tag } }) as const;

function settings({ withConnection }: Started) {
	return withConnection((connection) => ({
		journal: connection.pragma('journal_mode', { simple: true }),
		synchronous: connection.pragma('synchronous', { simple: true }),
		foreignKeys: connection.pragma('foreign_keys', { simple: true })
	}));
}

beforeEach(() => void (folder = mkdtempSync(join(tmpdir(), 'case-log-'))));
afterEach(() => {
	vi.unstubAllEnvs();
	rmSync(folder, { recursive: true });
});

describe('the database', () => {
	// SQLite, "PRAGMA synchronous": 2 is FULL, which alone keeps a commit in WAL mode through a power cut.
	it('syncs every commit and checks references, when it is new and when it is opened again', async () => {
		for (const round of ['new', 'again']) {
			const started = await start();
			expect([round, await settings(started)]).toEqual([round, { journal: 'wal', synchronous: 2, foreignKeys: 1 }]);
			await started.db.destroy();
		}
	});

	it('turns a file that was left in another mode to WAL', async () => {
		await (await start()).db.destroy();
		const file = new Database(join(folder, 'wordkeep.db'));
		expect(file.pragma('journal_mode = DELETE', { simple: true })).toBe('delete');
		file.close();
		const started = await start();
		expect((await settings(started)).journal).toBe('wal');
		await started.db.destroy();
	});

	it('refuses to change or delete a row of the case log, and keeps it', async () => {
		const started = await start();
		await withCase(started);
		await started.append('tamu-rilo-38', 'a', [placed('one'), placed('two')]);
		const before = await started.db('case_log');
		expect(before).toHaveLength(2);
		const never = 'the case log is appended to, never changed';
		await expect(started.db('case_log').update({ sender: 'b' })).rejects.toThrow(never);
		await expect(started.db('case_log').where({ position: 2 }).delete()).rejects.toThrow(never);
		await expect(started.db.raw('DELETE FROM case_log')).rejects.toThrow(never);
		await expect(started.db('case_log').insert({ ...before[0], position: 3 })).rejects.toThrow('UNIQUE');
		expect(await started.db('case_log')).toEqual(before);
		await started.db.destroy();
	});

	it('refuses a case log without its case, and to remove a case that has one', async () => {
		const started = await start();
		await withCase(started);
		await expect(started.append('no-case-00', 'a', [placed('one')])).rejects.toThrow('FOREIGN KEY');
		await started.append('tamu-rilo-38', 'a', [placed('one')]);
		await expect(started.db('cases').delete()).rejects.toThrow('FOREIGN KEY');
		await started.db.destroy();
	});
});

describe('appending', () => {
	it('stores nothing of a batch in which an id is taken, and goes on', async () => {
		const started = await start();
		await withCase(started);
		await started.append('tamu-rilo-38', 'a', [placed('one')]);
		const batch = [placed('two'), placed('one', '8')];
		await expect(started.append('tamu-rilo-38', 'a', batch)).rejects.toBeInstanceOf(started.IdTaken);
		expect(await started.db('case_log')).toHaveLength(1);
		expect(await started.append('tamu-rilo-38', 'a', [placed('two')])).toEqual([{ id: 'two', position: 2 }]);
		await started.db.destroy();
	});

	it('goes on with position and chain after the file was opened again', async () => {
		const first = await start();
		await withCase(first);
		await first.append('tamu-rilo-38', 'a', [placed('one'), placed('two')]);
		await first.db.destroy();
		const second = await start();
		expect(await second.append('tamu-rilo-38', 'a', [placed('three'), placed('one')])).toEqual([
			{ id: 'three', position: 3 },
			{ id: 'one', position: 1 }
		]);
		const { verifyChains } = await import('../../../src/lib/server/log/verify');
		expect(await verifyChains(second.db)).toEqual([
			{ code: 'tamu-rilo-38', ok: true, entries: 3, head: expect.stringMatching(/^[0-9a-f]{64}$/) }
		]);
		await second.db.destroy();
	});

	it('tells watchers in the order of the log, however many append at once', async () => {
		const started = await start();
		await withCase(started);
		const { hub, staffRoom } = await import('../../../src/lib/server/live/hub');
		const heard: number[] = [];
		hub.listen(staffRoom('tamu-rilo-38'), {
			entries: (events) => void heard.push(...events.map(({ position }) => position))
		});
		const ids = Array.from({ length: 60 }, (_, index) => `entry-${index}`);
		await Promise.all(ids.map((id) => started.append('tamu-rilo-38', 'a', [placed(id)])));
		expect(heard).toEqual(ids.map((_, index) => index + 1));
		await started.db.destroy();
	});
});
