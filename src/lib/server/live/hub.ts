import type { StoredEvent } from '../log/log';

/** What goes over a stream beside the log and is not worth keeping. */
export interface Passing {
	/** name of the server-sent event */
	name: string;
	data: unknown;
}

export interface Listener {
	entries?(events: StoredEvent[]): void;
	passing?(message: Passing): void;
}

/**
 * Carries what has happened to those who watch. Rooms are named by what they are about: the staff of a case, one
 * patient view, one account. It holds listeners only; the log is the memory.
 */
class Hub {
	#rooms = new Map<string, Set<Listener>>();

	listen(room: string, listener: Listener): () => void {
		const listeners = this.#rooms.get(room) ?? new Set();
		this.#rooms.set(room, listeners.add(listener));
		return () => {
			listeners.delete(listener);
			if (listeners.size === 0 && this.#rooms.get(room) === listeners) this.#rooms.delete(room);
		};
	}

	/** Call after the entries are on disk. */
	entries(room: string, events: StoredEvent[]): void {
		for (const listener of this.#rooms.get(room) ?? []) listener.entries?.(events);
	}

	passing(room: string, message: Passing): void {
		for (const listener of this.#rooms.get(room) ?? []) listener.passing?.(message);
	}

	/** How many listen in a room. */
	count(room: string): number {
		return this.#rooms.get(room)?.size ?? 0;
	}
}

export const hub = new Hub();

export function staffRoom(code: string): string {
	return `case ${code}`;
}

export function patientRoom(view: string): string {
	return `patient view ${view}`;
}

/** What is said here: the rights of an account changed. */
export function accountRoom(account: string): string {
	return `account ${account}`;
}
