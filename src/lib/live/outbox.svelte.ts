import type { AnyCaseEvent } from '$lib/mapping/events';
import { OutboxStore, type Queued } from './outbox-store';

/** Why entries do not get through, besides a server that is not reached. */
export type Obstacle = 'signed-out' | 'not-allowed' | null;

const MOST_AT_ONCE = 100;
const FIRST_WAIT = 250;
const LONGEST_WAIT = 4000;
/** A server that has not answered by then is asked again: a cut cable gives no answer at all. */
const ANSWER_DUE = 10_000;

/**
 * What this device has saved and the server does not have yet. An entry is written to the device's disk before
 * anything else happens with it, then sent in order until the server says it is stored. Sending twice is harmless:
 * the same id is one entry.
 */
export class Outbox {
	/** saved here, not on the server yet; in order */
	waiting = $state.raw<Queued[]>([]);
	/** refused by the server: set aside, never thrown away */
	refused = $state.raw<Queued[]>([]);
	/** the server answered the last time it was asked */
	reached = $state(true);
	obstacle = $state<Obstacle>(null);

	#store: OutboxStore;
	#url: string;
	#onRefused: (event: AnyCaseEvent) => void;
	#sending = false;
	#closed = false;
	#wait = FIRST_WAIT;
	#timer: ReturnType<typeof setTimeout> | undefined;
	#wake = () => this.#sendSoon(0);

	private constructor(store: OutboxStore, url: string, entries: Queued[], onRefused: (event: AnyCaseEvent) => void) {
		this.#store = store;
		this.#url = url;
		this.#onRefused = onRefused;
		this.waiting = entries.filter((entry) => entry.refused === undefined);
		this.refused = entries.filter((entry) => entry.refused !== undefined);
	}

	/**
	 * @param queue names the entries of this outbox on the device
	 * @param url where they are sent
	 * @param onRefused called with an entry that the server refuses, after it was set aside
	 */
	static async open(
		queue: string,
		url: string,
		onRefused: (event: AnyCaseEvent) => void = () => undefined
	): Promise<Outbox> {
		const store = await OutboxStore.open(queue);
		const outbox = new Outbox(store, url, await store.all(), onRefused);
		addEventListener('online', outbox.#wake);
		document.addEventListener('visibilitychange', outbox.#wake);
		outbox.#sendSoon(0);
		return outbox;
	}

	/** Milliseconds the oldest entry has waited, by the device's clock. */
	oldest(now = Date.now()): number {
		const [first] = this.waiting;
		return first ? Math.max(0, now - first.since) : 0;
	}

	/**
	 * Saves entries on this device; resolves once they are on its disk. Sending goes on behind.
	 *
	 * @throws DOMException when the device cannot save them: nothing was saved then
	 */
	async add(events: AnyCaseEvent[]): Promise<void> {
		const queued = await this.#store.add(events);
		this.waiting = [...this.waiting, ...queued];
		// At once, before the page draws what has changed: on the other screens each millisecond counts.
		void this.#sendAll();
	}

	close(): void {
		this.#closed = true;
		clearTimeout(this.#timer);
		removeEventListener('online', this.#wake);
		document.removeEventListener('visibilitychange', this.#wake);
		this.#store.close();
	}

	#sendSoon(after: number): void {
		if (this.#sending || this.#closed) return;
		clearTimeout(this.#timer);
		this.#timer = setTimeout(() => void this.#sendAll(), after);
	}

	async #sendAll(): Promise<void> {
		if (this.#sending || this.#closed) return;
		clearTimeout(this.#timer);
		this.#sending = true;
		let size = MOST_AT_ONCE;
		try {
			while (this.waiting.length > 0 && !this.#closed) {
				const batch = this.waiting.slice(0, size);
				// Whatever goes wrong, the entries are kept and sent again.
				const outcome = await this.#send(batch).catch(() => 'again' as const);
				if (outcome === 'too-much' && batch.length > 1) size = Math.ceil(batch.length / 2);
				else if (outcome === 'too-much') await this.#setAside(batch[0]!, 'too large to be sent');
				else if (outcome === 'again') return this.#tryLater();
			}
			this.#wait = FIRST_WAIT;
		} finally {
			this.#sending = false;
		}
		if (this.waiting.length > 0) this.#sendSoon(0);
	}

	#tryLater(): void {
		this.#sending = false;
		this.#sendSoon(this.#wait);
		this.#wait = Math.min(LONGEST_WAIT, this.#wait * 2);
	}

	async #send(batch: Queued[]): Promise<'done' | 'too-much' | 'again'> {
		let response: Response;
		try {
			response = await fetch(this.#url, {
				method: 'POST',
				headers: { 'content-type': 'application/json' },
				body: JSON.stringify({ events: batch.map(({ event }) => event) }),
				signal: AbortSignal.timeout(ANSWER_DUE)
			});
		} catch {
			this.reached = false;
			return 'again';
		}
		this.reached = response.status < 500;
		this.obstacle = response.status === 401 ? 'signed-out' : isDenied(response.status) ? 'not-allowed' : null;
		if (response.ok) {
			await this.#store.remove(batch);
			const sent = new Set(batch);
			this.waiting = this.waiting.filter((entry) => !sent.has(entry));
			return 'done';
		}
		if (response.status === 413) return 'too-much';
		if (response.status === 409 || response.status === 422) return await this.#setAsideRefused(batch, response);
		return 'again';
	}

	async #setAsideRefused(batch: Queued[], response: Response): Promise<'done' | 'again'> {
		const { error, index } = (await response.json()) as { error: string; index?: number };
		const entry = index === undefined ? undefined : batch[index];
		if (!entry) return 'again';
		await this.#setAside(entry, error);
		return 'done';
	}

	async #setAside(entry: Queued, reason: string): Promise<void> {
		const refused = await this.#store.refuse(entry, reason);
		this.waiting = this.waiting.filter((other) => other !== entry);
		this.refused = [...this.refused, refused];
		this.#onRefused(entry.event);
	}
}

function isDenied(status: number): boolean {
	return status === 403 || status === 404;
}
