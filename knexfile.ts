import { mkdirSync } from 'node:fs';
import { join } from 'node:path';
import type { Knex } from 'knex';

interface RawConnection {
	pragma(source: string, options?: { simple: boolean }): unknown;
}

/** Everything Wordkeep keeps lies in DATA_DIR; `:memory:` is for tests. */
export const DATA_DIR = process.env.DATA_DIR ?? 'data';

function databaseFile(): string {
	if (DATA_DIR === ':memory:') return ':memory:';
	mkdirSync(DATA_DIR, { recursive: true });
	return join(DATA_DIR, 'wordkeep.db');
}

const config: Knex.Config = {
	client: 'better-sqlite3',
	connection: { filename: databaseFile() },
	useNullAsDefault: true,
	pool: {
		// One connection: a second one in this process would block the event loop while a transaction is open.
		min: 1,
		max: 1,
		afterCreate(connection: RawConnection, done: (error: Error | null, connection: RawConnection) => void) {
			connection.pragma('busy_timeout = 5000');
			connection.pragma('journal_mode = WAL');
			// better-sqlite3 is compiled with NORMAL in WAL mode, which loses commits on a power cut.
			connection.pragma('synchronous = FULL');
			connection.pragma('foreign_keys = ON');
			connection.pragma('fullfsync = ON');
			connection.pragma('checkpoint_fullfsync = ON');
			done(null, connection);
		}
	},
	migrations: { directory: './migrations', extension: 'ts', loadExtensions: ['.ts'] }
};

export default config;
