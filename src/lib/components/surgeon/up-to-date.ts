import type { Run } from '$lib/mapping/case-state';

/** A device that has not been heard for this long is unheard. */
export const UNHEARD_AFTER = 3000;
/** Entries pass through a device in less than this; those that stay longer are waiting. */
export const WAITING_AFTER = 1000;

/** What was last heard of a staff device; all times in milliseconds. */
export interface DeviceWord {
	device: string;
	/** since it was heard */
	age: number;
	waiting: number;
	/** how long the oldest of its entries had waited when it was heard */
	oldest: number;
}

export interface Hearsay {
	/** since the server was heard */
	serverAge: number;
	/** the open runs, each with how long this screen has known it to be open */
	runs: { run: Pick<Run, 'lead'>; knownFor: number }[];
	devices: DeviceWord[];
}

/** Why results on the screen may be old, and for how many milliseconds. */
export interface OutOfDate {
	why: 'server' | 'examiner' | 'waiting';
	age: number;
}

/**
 * Whether what is on the screen may be old: null when it is up to date. With several causes the age is that of the
 * oldest, and the cause named is the one nearest to this screen.
 */
export function outOfDate({ serverAge, runs, devices }: Hearsay): OutOfDate | null {
	const found: OutOfDate[] = [];
	if (serverAge > UNHEARD_AFTER) found.push({ why: 'server', age: serverAge });
	for (const { run, knownFor } of runs) {
		if (run.lead === null) continue;
		const age = devices.find(({ device }) => device === run.lead)?.age ?? knownFor;
		if (age > UNHEARD_AFTER) found.push({ why: 'examiner', age });
	}
	for (const { waiting, oldest, age } of devices) {
		if (waiting > 0 && (oldest > WAITING_AFTER || oldest + age > UNHEARD_AFTER)) {
			found.push({ why: 'waiting', age: oldest + age });
		}
	}
	const [first] = found;
	return first ? { why: first.why, age: Math.max(...found.map(({ age }) => age)) } : null;
}
