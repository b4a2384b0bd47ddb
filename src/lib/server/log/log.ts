import type { Database, Statement } from 'better-sqlite3';
import type { AnyCaseEvent, LogEvent, Receipt } from '$lib/mapping/events';
import { hub, staffRoom } from '$lib/server/live/hub';
import { prepared, withConnection } from '../database';
import type { CaseLogRow } from '../tables';
import { canonicalJson, chainHash, FIRST_PREVIOUS } from './chain';

export type StoredEvent = AnyCaseEvent & Receipt;

/** Where an event stands in the log of its case. */
export interface Place {
	id: string;
	position: number;
}

interface Appended {
	/** where every event given stands, in the order given */
	stored: Place[];
	/** those that were not in the log before */
	added: StoredEvent[];
}

/** An id that stands in the log of the case already, with other content. */
export class IdTaken extends Error {
	constructor(
		readonly index: number,
		readonly id: string
	) {
		super(`entry ${id} is in the case log already, with other content`);
	}
}

/**
 * Appends events to the log of a case, all or none, and returns after SQLite has synced them to disk and everybody who
 * watches the case was told. An event that is in the log already keeps its position and is not stored again.
 *
 * @param events checked against the schema
 * @param sender account id, or the id of a patient view
 * @throws IdTaken, with nothing stored
 */
export async function append(code: string, sender: string, events: AnyCaseEvent[]): Promise<Place[]> {
	return await withConnection((connection) => {
		const work = connection.transaction(() => appendRows(statementsOf(connection), code, sender, events));
		const { stored, added } = work.immediate();
		// While the connection is held, so that nobody hears of a later entry before an earlier one.
		if (added.length > 0) hub.entries(staffRoom(code), added);
		return stored;
	});
}

function appendRows(statements: Statements, code: string, sender: string, events: AnyCaseEvent[]): Appended {
	let { position, hash } = statements.head.get(code) ?? { position: 0, hash: FIRST_PREVIOUS };
	const appended: Appended = { stored: [], added: [] };
	for (const [index, event] of events.entries()) {
		const known = statements.byId.get(code, event.id);
		if (known) {
			if (canonicalJson(JSON.parse(known.event)) !== canonicalJson(event)) throw new IdTaken(index, event.id);
			appended.stored.push({ id: event.id, position: known.position });
			continue;
		}
		position++;
		const receivedAt = new Date().toISOString();
		hash = chainHash(hash, { case: code, position, receivedAt, sender, event });
		statements.insert.run(code, position, event.id, receivedAt, sender, JSON.stringify(event), hash);
		appended.stored.push({ id: event.id, position });
		appended.added.push({ position, receivedAt, sender, hash, ...event });
	}
	return appended;
}

interface Statements {
	head: Statement<[string], { position: number; hash: string }>;
	byId: Statement<[string, string], { position: number; event: string }>;
	insert: Statement<[string, number, string, string, string, string, string]>;
}

function statementsOf(connection: Database): Statements {
	return {
		head: prepared(
			connection,
			'SELECT position, hash FROM case_log WHERE case_code = ? ORDER BY position DESC LIMIT 1'
		),
		byId: prepared(connection, 'SELECT position, event FROM case_log WHERE case_code = ? AND id = ?'),
		insert: prepared(
			connection,
			`INSERT INTO case_log (case_code, position, id, received_at, sender, event, hash) VALUES (?, ?, ?, ?, ?, ?, ?)`
		)
	};
}

/** The entries of a case after a position, in order. */
export async function entriesAfter(code: string, after: number): Promise<StoredEvent[]> {
	return await withConnection((connection) =>
		prepared<[string, number], CaseLogRow>(
			connection,
			'SELECT * FROM case_log WHERE case_code = ? AND position > ? ORDER BY position'
		)
			.all(code, after)
			.map(toEvent)
	);
}

function toEvent(row: CaseLogRow): StoredEvent {
	const event = JSON.parse(row.event) as AnyCaseEvent;
	return {
		position: row.position,
		receivedAt: row.received_at,
		sender: row.sender,
		hash: row.hash,
		...event
	};
}

/** The case log as `fold` reads it. */
export async function logOf(code: string): Promise<LogEvent[]> {
	return await entriesAfter(code, 0);
}
