import { emptyCase, type CaseState } from '$lib/mapping/case-state';
import type { AnyCaseEvent, EventData, EventType, LogEvent } from '$lib/mapping/events';
import { fold } from '$lib/mapping/fold';
import type { Heard } from '$lib/stimuli/presence';
import { followStream } from './case-stream';
import { deviceName } from './device';
import { makeEvent } from './make-event';
import { Outbox } from './outbox.svelte';
import { ServerClock } from './server-clock.svelte';

/** One thing to note in the case log. */
export type Note = { [T in EventType]: [type: T, data: EventData[T]] }[EventType];

/**
 * The log of a case as this page has it: what the server has stored, then what this device still has to send. Every
 * live screen reads its state from here, and there is no other way for case data to reach it.
 */
export class LiveCase {
	readonly code: string;
	readonly device = deviceName('staff');
	readonly clock = new ServerClock();
	/** null on screens that only read */
	outbox = $state.raw<Outbox | null>(null);
	/** why nothing can be saved on this device, or null */
	storageFault = $state<string | null>(null);
	/** server time when the server was last heard; null before the first time */
	heardAt = $state<number | null>(null);
	/** the last word of every device of the case, by its name */
	heard = $state.raw<ReadonlyMap<string, Heard>>(new Map());
	/** counts the news about pairing, so that a page asks again */
	pairingNews = $state(0);

	#state = $state.raw<CaseState>(emptyCase());
	#log: LogEvent[] = [];
	#pending: LogEvent[] = [];
	#adding: Promise<unknown> = Promise.resolve();
	#end: (() => void)[] = [];
	#stopped = false;

	/** @param log the entries the page was loaded with */
	constructor(code: string, log: LogEvent[]) {
		this.code = code;
		this.#log = log;
		this.#refold();
	}

	/** The case as it stands, entries that wait on this device included. A new object after every change. */
	get state(): CaseState {
		return this.#state;
	}

	/** How many entries the server has, as far as this page knows. */
	get position(): number {
		return this.#log.at(-1)?.position ?? 0;
	}

	/** Follows the log until `stop`; with `append`, opens the outbox as well. */
	async start({ append }: { append: boolean }): Promise<void> {
		if (append) await this.#openOutbox();
		if (this.#stopped) return this.outbox?.close();
		this.#end.push(
			this.clock.start(),
			followStream(() => `/api/cases/${this.code}/stream?after=${this.position}`, {
				entry: (event) => this.#receive(event),
				heartbeat: () => (this.heardAt = this.clock.now()),
				passing: {
					presence: (heard: Heard) => this.#hear(heard),
					pairing: () => this.pairingNews++
				}
			})
		);
	}

	stop(): void {
		this.#stopped = true;
		for (const end of this.#end.splice(0)) end();
		this.outbox?.close();
	}

	/** What this device saved before and could not send yet comes back to life. */
	async #openOutbox(): Promise<void> {
		try {
			this.outbox = await Outbox.open(this.code, `/api/cases/${this.code}/events`, (event) => this.#drop(event));
			const known = new Set(this.#log.map(({ id }) => id));
			this.#pending = this.outbox.waiting.map(({ event }) => event).filter(({ id }) => !known.has(id));
			this.#refold();
		} catch (failure) {
			this.storageFault = String(failure);
		}
	}

	/**
	 * Notes something in the case log: resolves when it is saved on this device. Only then may a page act on it.
	 *
	 * @returns the entries as they were made
	 * @throws Error when this device cannot save: nothing was noted
	 */
	async note(...notes: Note[]): Promise<AnyCaseEvent[]> {
		const events = notes.map(([type, data]) => makeEvent(type, data, this.device, this.clock));
		const saved = this.#adding.then(async () => {
			if (!this.outbox) throw new Error(this.storageFault ?? 'this device cannot save');
			await this.outbox.add(events);
			this.#pending = [...this.#pending, ...events];
			this.#state = { ...fold(events, this.#state) };
		});
		this.#adding = saved.catch(() => undefined);
		await saved;
		return events;
	}

	/** An entry that waited here takes its place in the log when it comes back with its receipt. */
	#receive(event: LogEvent): void {
		if (event.position !== this.position + 1) return;
		this.#log.push(event);
		this.#pending = this.#pending.filter(({ id }) => id !== event.id);
		this.#state = { ...fold([event], this.#state) };
	}

	/** An entry the server refuses is not in the case: it is set aside in sight, and the case is as without it. */
	#drop(event: AnyCaseEvent): void {
		this.#pending = this.#pending.filter(({ id }) => id !== event.id);
		this.#refold();
	}

	#refold(): void {
		this.#state = fold([...this.#log, ...this.#pending]);
	}

	#hear(heard: Heard): void {
		const key = heard.kind === 'staff' ? heard.device : 'patient';
		this.heard = new Map(this.heard).set(key, heard);
	}
}
