import type { LogEvent } from '$lib/mapping/events';
import { db } from '../database';
import type { AccountRow } from '../tables';
import type { TeamMember } from './cases';

/** Names by account id: of the team, and of whoever else stands in the case log. */
export async function namesIn(log: readonly LogEvent[], team: readonly TeamMember[]): Promise<Record<string, string>> {
	const ids = new Set(log.flatMap(({ by, sender }) => [by, sender]).filter((id) => id !== undefined));
	const rows = await db<AccountRow>('accounts')
		.whereIn('id', [...ids])
		.select('id', 'name');
	return Object.fromEntries([...rows, ...team].map(({ id, name }) => [id, name]));
}
