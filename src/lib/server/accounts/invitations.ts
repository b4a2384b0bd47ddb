import { createHash, randomBytes } from 'node:crypto';
import type { Knex } from 'knex';
import { db } from '../database';
import { endStreamsOf } from '$lib/server/live/access';
import type { AccountRow, InvitationRow } from '../tables';
import { newAccountRow, toAccount, writePassword, type Account } from './accounts';

/** A link works once, within a week. */
export const INVITATION_DAYS = 7;
const A_DAY = 86_400_000;

export interface Invitation {
	/** goes into the link; only its SHA-256 is kept */
	token: string;
	/** RFC 3339 */
	expiresAt: string;
}

function hashOf(token: string): string {
	return createHash('sha256').update(token).digest('hex');
}

/** Makes a link for an account, or for the first administrator; the unused ones before it die. */
async function offer(trx: Knex.Transaction, accountId: string | null): Promise<Invitation> {
	const token = randomBytes(32).toString('base64url');
	const now = Date.now();
	const expiresAt = new Date(now + INVITATION_DAYS * A_DAY).toISOString();
	await trx<InvitationRow>('invitations').where({ account_id: accountId, used_at: null }).delete();
	await trx<InvitationRow>('invitations').insert({
		token_hash: hashOf(token),
		account_id: accountId,
		created_at: new Date(now).toISOString(),
		expires_at: expiresAt,
		used_at: null
	});
	return { token, expiresAt };
}

/** The links that still work. */
function usable(knex: Knex) {
	return knex<InvitationRow>('invitations').where({ used_at: null }).where('expires_at', '>', new Date().toISOString());
}

async function useUp(trx: Knex.Transaction, token: string): Promise<void> {
	await trx<InvitationRow>('invitations')
		.where({ token_hash: hashOf(token) })
		.update({ used_at: new Date().toISOString() });
}

/**
 * Makes a link with which somebody chooses a password: the first one, or a new one for one forgotten. The old
 * password holds until the link is used.
 */
export async function inviteAccount(accountId: string): Promise<Invitation> {
	return await db.transaction(async (trx) => await offer(trx, accountId));
}

/** When the open link of each account ends, by account id; RFC 3339. */
export async function openInvitations(): Promise<Map<string, string>> {
	const rows = await usable(db).whereNotNull('account_id');
	return new Map(rows.map(({ account_id, expires_at }) => [account_id!, expires_at]));
}

/** Whose link it is; null when it does not work, or its account is disabled. */
export async function invitee(token: string, knex: Knex = db): Promise<Account | null> {
	const link = await usable(knex)
		.where({ token_hash: hashOf(token) })
		.whereNotNull('account_id')
		.first();
	const row = link && (await knex<AccountRow>('accounts').where({ id: link.account_id!, disabled_at: null }).first());
	return row ? toAccount(row) : null;
}

/** Uses a link: sets the password, ends the account's sessions. Null, with nothing changed, when it does not work. */
export async function acceptInvitation(token: string, passwordHash: string): Promise<Account | null> {
	const accepted = await db.transaction(async (trx) => {
		const account = await invitee(token, trx);
		if (!account) return null;
		await useUp(trx, token);
		await writePassword(trx, account.id, passwordHash);
		return { ...account, joined: true };
	});
	if (accepted) endStreamsOf([accepted.id]);
	return accepted;
}

/** While there is no account, makes the link of the first administrator; null afterwards. */
export async function offerSetUp(): Promise<string | null> {
	return await db.transaction(async (trx) => {
		if (await trx<AccountRow>('accounts').first('id')) return null;
		return (await offer(trx, null)).token;
	});
}

/** Whether the first administrator may be made with this link. */
export async function isSetUpOpen(token: string, knex: Knex = db): Promise<boolean> {
	const link = await usable(knex)
		.where({ token_hash: hashOf(token), account_id: null })
		.first();
	return link !== undefined && !(await knex<AccountRow>('accounts').first('id'));
}

/** Makes the first administrator. Null, with nothing changed, when the link does not work or there is an account. */
export async function acceptSetUp(
	token: string,
	given: { name: string; email: string },
	passwordHash: string
): Promise<Account | null> {
	return await db.transaction(async (trx) => {
		if (!(await isSetUpOpen(token, trx))) return null;
		await useUp(trx, token);
		const row = newAccountRow({ ...given, roles: ['administrator'] }, passwordHash);
		await trx<AccountRow>('accounts').insert(row);
		return toAccount(row);
	});
}
