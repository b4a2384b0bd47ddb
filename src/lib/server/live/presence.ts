import type { Heard } from '$lib/stimuli/presence';
import { hub, staffRoom } from './hub';
import { serverNow } from './server-clock';

const last = new Map<string, Map<string, Heard>>();

/** Tells everybody on a case what a device said of itself. */
export function hear(code: string, heard: Heard): void {
	const room = last.get(code) ?? new Map<string, Heard>();
	last.set(code, room);
	room.set(heard.kind === 'staff' ? heard.device : 'patient', heard);
	forgetSilent(room);
	hub.passing(staffRoom(code), { name: 'presence', data: heard });
}

/** What a screen that comes late has missed. */
export function lastHeard(code: string): Heard[] {
	return [...(last.get(code)?.values() ?? [])];
}

const FORGET_AFTER = 10 * 60_000;

function forgetSilent(room: Map<string, Heard>): void {
	const now = serverNow();
	for (const [key, { heardAt }] of room) if (now - heardAt > FORGET_AFTER) room.delete(key);
}
