import { openDB, type DBSchema, type IDBPDatabase } from 'idb';
import type { AnyCaseEvent } from '$lib/mapping/events';

/** An entry that this device keeps until the server has it. */
export interface Queued {
	/** the order in which this device made it */
	sequence: number;
	/** what it waits for: a case, or a patient view */
	queue: string;
	event: AnyCaseEvent;
	/** milliseconds since the epoch, by the device's clock */
	since: number;
	/** what the server said when it refused the entry; it is set aside then */
	refused?: string;
}

interface Schema extends DBSchema {
	entries: { key: number; value: Queued; indexes: { queue: string } };
}

/** The entries of one queue in IndexedDB, written so that they outlast a power cut. */
export class OutboxStore {
	private constructor(
		private readonly db: IDBPDatabase<Schema>,
		private readonly queue: string
	) {}

	static async open(queue: string): Promise<OutboxStore> {
		const db = await openDB<Schema>('wordkeep-outbox', 1, {
			upgrade(db) {
				db.createObjectStore('entries', { keyPath: 'sequence', autoIncrement: true }).createIndex('queue', 'queue');
			}
		});
		return new OutboxStore(db, queue);
	}

	/** Every entry that waits or was refused, in order. */
	async all(): Promise<Queued[]> {
		return await this.db.getAllFromIndex('entries', 'queue', this.queue);
	}

	/**
	 * Keeps entries, all or none; resolves after the browser has flushed them to disk (`strict` durability).
	 *
	 * @throws DOMException when the device cannot keep them: its disk is full, for one
	 */
	async add(events: AnyCaseEvent[]): Promise<Queued[]> {
		const transaction = this.db.transaction('entries', 'readwrite', { durability: 'strict' });
		const since = Date.now();
		const queued = await Promise.all(
			events.map(async (event) => {
				const entry = { queue: this.queue, event, since };
				const sequence = await transaction.store.add(entry as Queued);
				return { ...entry, sequence };
			})
		);
		await transaction.done;
		return queued;
	}

	async remove(entries: Queued[]): Promise<void> {
		const transaction = this.db.transaction('entries', 'readwrite', { durability: 'strict' });
		await Promise.all([...entries.map(({ sequence }) => transaction.store.delete(sequence)), transaction.done]);
	}

	/** Sets an entry aside with the reason the server gave. */
	async refuse(entry: Queued, reason: string): Promise<Queued> {
		const refused = { ...entry, refused: reason };
		await this.db.put('entries', refused);
		return refused;
	}

	close(): void {
		this.db.close();
	}
}
