import { randomUUID } from 'node:crypto';
import type { Knex } from 'knex';
import { db } from '../database';
import { endStreamsOf } from '$lib/server/live/access';
import type { AccountRow, SessionRow } from '../tables';
import type { Role } from './roles';

/** Somebody who may sign in. */
export interface Account {
	id: string;
	email: string;
	name: string;
	roles: Role[];
	disabled: boolean;
	/** whether a password was set, so that the first link was used */
	joined: boolean;
}

export function toAccount(row: AccountRow): Account {
	return {
		id: row.id,
		email: row.email,
		name: row.name,
		roles: JSON.parse(row.roles) as Role[],
		disabled: row.disabled_at !== null,
		joined: row.password_hash !== null
	};
}

/** E-mail addresses are compared without regard to case or blanks around them. */
export function normalEmail(email: string): string {
	return email.trim().toLowerCase();
}

export async function listAccounts(): Promise<Account[]> {
	return (await db<AccountRow>('accounts').orderBy('name')).map(toAccount);
}

export async function accountById(id: string): Promise<Account | null> {
	const row = await db<AccountRow>('accounts').where({ id }).first();
	return row ? toAccount(row) : null;
}

/** The account and its password hash, for signing in. */
export async function credentialsOf(email: string): Promise<{ account: Account; passwordHash: string | null } | null> {
	const row = await db<AccountRow>('accounts')
		.where({ email: normalEmail(email) })
		.first();
	return row ? { account: toAccount(row), passwordHash: row.password_hash } : null;
}

export interface NewAccount {
	email: string;
	name: string;
	roles: Role[];
}

/** The row of a new account; without a hash it waits for its first link to be used. */
export function newAccountRow(given: NewAccount, passwordHash: string | null): AccountRow {
	return {
		id: randomUUID(),
		email: normalEmail(given.email),
		name: given.name.trim(),
		roles: JSON.stringify(given.roles),
		password_hash: passwordHash,
		created_at: new Date().toISOString(),
		disabled_at: null
	};
}

/**
 * Makes an account that has no password yet.
 *
 * @returns null when the address has an account already
 */
export async function createAccount(given: NewAccount): Promise<Account | null> {
	const row = newAccountRow(given, null);
	const inserted = await db<AccountRow>('accounts').insert(row).onConflict('email').ignore().returning('id');
	return inserted.length > 0 ? toAccount(row) : null;
}

/** Sets a password and ends every session that the old one opened. */
export async function setPassword(id: string, passwordHash: string): Promise<void> {
	await db.transaction(async (trx) => await writePassword(trx, id, passwordHash));
	endStreamsOf([id]);
}

/** As `setPassword`, inside a transaction of somebody else, who ends the open streams after it. */
export async function writePassword(trx: Knex.Transaction, id: string, passwordHash: string): Promise<void> {
	await trx<AccountRow>('accounts').where({ id }).update({ password_hash: passwordHash });
	await trx<SessionRow>('sessions').where({ account_id: id }).delete();
}

export interface AccountChange {
	name?: string;
	roles?: Role[];
	disabled?: boolean;
}

/**
 * Changes an account. Roles hold from its next request on; disabling ends its sessions.
 *
 * @returns null for an unknown account, `last-administrator` when nobody would be left who could undo the change
 */
export async function changeAccount(id: string, change: AccountChange): Promise<Account | null | 'last-administrator'> {
	const changed = await db.transaction(async (trx) => {
		const row = await trx<AccountRow>('accounts').where({ id }).first();
		if (!row) return null;
		const next: AccountRow = { ...row };
		if (change.name !== undefined) next.name = change.name;
		if (change.roles !== undefined) next.roles = JSON.stringify(change.roles);
		if (change.disabled === false) next.disabled_at = null;
		if (change.disabled === true) next.disabled_at ??= new Date().toISOString();
		const others = (await trx<AccountRow>('accounts').whereNot({ id })).map(toAccount);
		if (administers(toAccount(row)) && ![...others, toAccount(next)].some(administers)) return 'last-administrator';
		const { name, roles, disabled_at } = next;
		await trx<AccountRow>('accounts').where({ id }).update({ name, roles, disabled_at });
		if (disabled_at !== null) await trx<SessionRow>('sessions').where({ account_id: id }).delete();
		return toAccount(next);
	});
	endStreamsOf([id]);
	return changed;
}

/** Whether somebody can sign in and administer: one who never set a password cannot. */
function administers(account: Account): boolean {
	return account.roles.includes('administrator') && account.joined && !account.disabled;
}
