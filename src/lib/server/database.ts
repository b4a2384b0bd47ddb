import knexModule, { type Knex } from 'knex';
import type { Database, Statement } from 'better-sqlite3';
import config from '../../../knexfile';

/** Migrations travel in the bundle, under the file names that the knex command line records. */
const modules = import.meta.glob<Knex.Migration>('/migrations/*.ts', { eager: true });

class BundledMigrations implements Knex.MigrationSource<string> {
	async getMigrations(): Promise<string[]> {
		return Object.keys(modules).sort();
	}

	getMigrationName(path: string): string {
		return path.slice(path.lastIndexOf('/') + 1);
	}

	async getMigration(path: string): Promise<Knex.Migration> {
		const migration = modules[path];
		if (!migration) throw new Error(`no migration ${path}`);
		return migration;
	}
}

/** The only connection to the database in this process. */
export const db: Knex = knexModule(config);

/**
 * Brings the database up to date and makes sure that it keeps what it acknowledges.
 *
 * @throws Error when SQLite does not write as it must
 */
export async function openDatabase(): Promise<string[]> {
	const [, done] = (await db.migrate.latest({ migrationSource: new BundledMigrations() })) as [number, string[]];
	await assertDurable();
	return done;
}

const FULL = 2;

async function assertDurable(): Promise<void> {
	await withConnection((connection) => {
		const found = {
			journal: connection.pragma('journal_mode', { simple: true }),
			synchronous: connection.pragma('synchronous', { simple: true }),
			foreignKeys: connection.pragma('foreign_keys', { simple: true })
		};
		const durable = found.journal === 'wal' || connection.memory;
		if (!durable || found.synchronous !== FULL || found.foreignKeys !== 1) {
			throw new Error(`the database is not set up to keep what it acknowledges: ${JSON.stringify(found)}`);
		}
	});
}

/** Runs `work` on the one connection, while nothing else can. */
export async function withConnection<T>(work: (connection: Database) => T | Promise<T>): Promise<T> {
	const connection = (await db.client.acquireConnection()) as Database;
	try {
		return await work(connection);
	} finally {
		await db.client.releaseConnection(connection);
	}
}

const statements = new WeakMap<Database, Map<string, Statement>>();

/** A statement of a connection, compiled once: for what every request of a run asks. */
export function prepared<Given extends unknown[], Row>(connection: Database, sql: string): Statement<Given, Row> {
	const known = statements.get(connection) ?? new Map<string, Statement>();
	statements.set(connection, known);
	const statement = known.get(sql) ?? connection.prepare(sql);
	known.set(sql, statement);
	return statement as unknown as Statement<Given, Row>;
}
