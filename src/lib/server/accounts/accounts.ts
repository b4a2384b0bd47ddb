import { randomUUID } from 'node:crypto';
import { db } from '../database';
import type { AccountRow } from '../tables';
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

/**
 * Makes an account that has no password yet.
 *
 * @returns null when the address has an account already
 */
export async function createAccount(given: { email: string; name: string; roles: Role[] }): Promise<Account | null> {
	const row: AccountRow = {
		id: randomUUID(),
		email: normalEmail(given.email),
		name: given.name.trim(),
		roles: JSON.stringify(given.roles),
		password_hash: null,
		created_at: new Date().toISOString(),
		disabled_at: null
	};
	const inserted = await db<AccountRow>('accounts').insert(row).onConflict('email').ignore().returning('id');
	return inserted.length > 0 ? toAccount(row) : null;
}

export async function setPassword(id: string, passwordHash: string): Promise<void> {
	await db<AccountRow>('accounts').where({ id }).update({ password_hash: passwordHash });
}

export async function setRoles(id: string, roles: Role[]): Promise<void> {
	await db<AccountRow>('accounts')
		.where({ id })
		.update({ roles: JSON.stringify(roles) });
}

export async function setDisabled(id: string, disabled: boolean): Promise<void> {
	await db<AccountRow>('accounts')
		.where({ id })
		.update({ disabled_at: disabled ? new Date().toISOString() : null });
}
