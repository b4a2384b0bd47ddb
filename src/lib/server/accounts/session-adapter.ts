import type { Adapter, DatabaseSession, DatabaseUser } from 'lucia';
import type { Knex } from 'knex';
import { prepared, withConnection } from '../database';
import type { AccountRow, SessionRow } from '../tables';
import { toAccount } from './accounts';

type Joined = AccountRow & { session_id: string; expires_at: number };

/** Every request asks it. */
const SESSION = `SELECT accounts.*, sessions.id AS session_id, sessions.expires_at FROM sessions
	JOIN accounts ON accounts.id = sessions.account_id WHERE sessions.id = ?`;

/** Keeps lucia's sessions in our one connection. */
export class SessionAdapter implements Adapter {
	constructor(private readonly db: Knex) {}

	async getSessionAndUser(id: string): Promise<[DatabaseSession | null, DatabaseUser | null]> {
		const row = await withConnection((connection) => prepared<[string], Joined>(connection, SESSION).get(id));
		if (!row) return [null, null];
		return [
			toSession({ id: row.session_id, account_id: row.id, expires_at: row.expires_at }),
			{ id: row.id, attributes: { account: toAccount(row) } }
		];
	}

	async getUserSessions(userId: string): Promise<DatabaseSession[]> {
		return (await this.db<SessionRow>('sessions').where({ account_id: userId })).map(toSession);
	}

	async setSession(session: DatabaseSession): Promise<void> {
		await this.db<SessionRow>('sessions').insert({
			id: session.id,
			account_id: session.userId,
			expires_at: seconds(session.expiresAt)
		});
	}

	async updateSessionExpiration(id: string, expiresAt: Date): Promise<void> {
		await this.db<SessionRow>('sessions')
			.where({ id })
			.update({ expires_at: seconds(expiresAt) });
	}

	async deleteSession(id: string): Promise<void> {
		await this.db<SessionRow>('sessions').where({ id }).delete();
	}

	async deleteUserSessions(userId: string): Promise<void> {
		await this.db<SessionRow>('sessions').where({ account_id: userId }).delete();
	}

	async deleteExpiredSessions(): Promise<void> {
		await this.db<SessionRow>('sessions').where('expires_at', '<=', seconds(new Date())).delete();
	}
}

function toSession(row: SessionRow): DatabaseSession {
	return { id: row.id, userId: row.account_id, expiresAt: new Date(row.expires_at * 1000), attributes: {} };
}

function seconds(date: Date): number {
	return Math.floor(date.getTime() / 1000);
}
