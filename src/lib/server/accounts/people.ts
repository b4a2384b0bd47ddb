import { listAccounts, type Account } from './accounts';
import { inviteAccount, openInvitations } from './invitations';
import type { Role } from './roles';

/** An account as administrators see it. */
export interface Person extends Account {
	/** when the open one-time link ends, RFC 3339; null without one */
	linkUntil: string | null;
}

/** A one-time link, to be handed over by whoever asked for it. */
export interface PersonLink {
	/** path on this server */
	link: string;
	/** RFC 3339 */
	expiresAt: string;
}

export async function listPeople(): Promise<Person[]> {
	const links = await openInvitations();
	return (await listAccounts()).map((account) => ({ ...account, linkUntil: links.get(account.id) ?? null }));
}

export async function linkFor(account: Account): Promise<PersonLink> {
	const { token, expiresAt } = await inviteAccount(account.id);
	return { link: `/invitation/${token}`, expiresAt };
}

/** Those who can be chosen for the team of a case. */
export async function teamCandidates(): Promise<{ id: string; name: string; roles: Role[] }[]> {
	const enabled = (await listAccounts()).filter(({ disabled }) => !disabled);
	return enabled.map(({ id, name, roles }) => ({ id, name, roles }));
}
