import { db } from './database';

interface SettingRow {
	name: string;
	/** JSON */
	value: string;
}

/** Settings of the whole installation. */
export interface Settings {
	/** the clinic's time zone, by its IANA name; the server's own until it is set */
	zone: string;
}

/** Whether this is a time zone that times can be shown in. */
export function isZone(zone: string): boolean {
	try {
		new Intl.DateTimeFormat('en', { timeZone: zone });
		return true;
	} catch {
		return false;
	}
}

export async function readSettings(): Promise<Settings> {
	const row = await db<SettingRow>('settings').where({ name: 'zone' }).first();
	return { zone: row ? (JSON.parse(row.value) as string) : new Intl.DateTimeFormat().resolvedOptions().timeZone };
}

export async function changeSettings(change: Partial<Settings>): Promise<void> {
	const rows = Object.entries(change).map(([name, value]) => ({ name, value: JSON.stringify(value) }));
	if (rows.length > 0) await db<SettingRow>('settings').insert(rows).onConflict('name').merge();
}
