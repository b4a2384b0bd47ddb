import Database from 'better-sqlite3';
import { createServer } from 'node:http';
import { join } from 'node:path';

/**
 * The least that can acknowledge an entry durably: Node's own http server and one prepared insert, synced to disk as
 * Wordkeep syncs. It knows no accounts, no cases and no rules, and checks nothing.
 *
 * Started with DATA_DIR and PORT; says "listening" once it does.
 */
const database = new Database(join(process.env.DATA_DIR!, 'bare.db'));
database.pragma('journal_mode = WAL');
database.pragma('synchronous = FULL');
database.exec(
	'CREATE TABLE entries (position INTEGER PRIMARY KEY, id TEXT, at TEXT, sender TEXT, event TEXT, hash TEXT)'
);
const insert = database.prepare('INSERT INTO entries (id, at, sender, event, hash) VALUES (?, ?, ?, ?, ?)');

/** As long as what Wordkeep stores beside the entry. */
const SENDER = '0'.repeat(36);
const HASH = '0'.repeat(64);

createServer((request, response) => {
	const chunks: Buffer[] = [];
	request.on('data', (chunk: Buffer) => chunks.push(chunk));
	request.on('end', () => {
		const { events } = JSON.parse(Buffer.concat(chunks).toString('utf8')) as { events: { id: string }[] };
		const stored = events.map((event) => {
			const at = new Date().toISOString();
			const { lastInsertRowid } = insert.run(event.id, at, SENDER, JSON.stringify(event), HASH);
			return { id: event.id, position: Number(lastInsertRowid) };
		});
		response.setHeader('content-type', 'application/json');
		response.end(JSON.stringify({ stored }));
	});
}).listen(Number(process.env.PORT), () => console.log('listening'));
