// Not crypto.randomUUID: a page that came over plain http from another computer of the network does not have it.
import { v4 } from 'uuid';

/** Names this page load: a device's own clock is only comparable within one. */
export const BOOT = v4();

/** Names this browser, kept over reloads. The patient view has a name of its own, even in the same browser. */
export function deviceName(role: 'staff' | 'patient'): string {
	const key = `wordkeep-device-${role}`;
	const known = localStorage.getItem(key);
	if (known) return known;
	const name = `${role}-${v4().slice(0, 8)}`;
	localStorage.setItem(key, name);
	return name;
}
