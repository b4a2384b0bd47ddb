import type { Heard } from '$lib/stimuli/presence';
import { localNow } from './server-clock.svelte';

interface Last {
	/** server time of the word itself: the same one may be passed on twice */
	heardAt: number;
	/** this page's clock when it came */
	here: number;
	/** it came with what the page had missed, and may be old */
	first: boolean;
}

/** When the server and each staff device were last heard, by this page's own clock, which is never set back. */
export class Hearing {
	readonly #since = localNow();
	#server = this.#since;
	#devices = new Map<string, Last & { word: Heard & { kind: 'staff' } }>();

	server(): void {
		this.#server = localNow();
	}

	/** Takes in the last words of all devices; those that were known already change nothing. */
	devices(heard: Iterable<Heard>): void {
		for (const word of heard) {
			if (word.kind !== 'staff') continue;
			const known = this.#devices.get(word.device);
			if (known?.heardAt === word.heardAt) continue;
			this.#devices.set(word.device, { word, heardAt: word.heardAt, here: localNow(), first: known === undefined });
		}
	}

	/** Milliseconds since the server was heard, or since this page began to listen. */
	get serverAge(): number {
		return localNow() - this.#server;
	}

	/** Milliseconds since this page began to listen. */
	get age(): number {
		return localNow() - this.#since;
	}

	/**
	 * What was last heard of every staff device, with its age in milliseconds.
	 *
	 * @param serverNow the server's time, or null while it is not known
	 */
	words(serverNow: number | null): { device: string; age: number; waiting: number; oldest: number }[] {
		return [...this.#devices.values()].map(({ word, heardAt, here, first }) => {
			const sinceHere = localNow() - here;
			const age = first && serverNow !== null ? Math.max(sinceHere, serverNow - heardAt) : sinceHere;
			return { device: word.device, age, waiting: word.waiting, oldest: word.oldest };
		});
	}
}
