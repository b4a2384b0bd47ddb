import type { ErrorKind } from '$lib/mapping/vocabulary';
import { assignKeys, DEFAULT_COMMAND_KEYS, type Command, type KeyMap } from './keys';

const STORED = 'wordkeep-keys';

interface Stored {
	commands: Partial<Record<Command, string>>;
	kinds: Partial<Record<ErrorKind, string>>;
	pad: boolean;
}

const NOTHING: Stored = { commands: {}, kinds: {}, pad: false };

/** The keys that somebody chose on this device. */
export class KeyChoice {
	#stored = $state.raw<Stored>(read());

	get usesPad(): boolean {
		return this.#stored.pad;
	}

	/** The whole key map for the kinds that a protocol has on. */
	mapFor(kinds: readonly ErrorKind[]): KeyMap {
		return assignKeys(kinds, {
			commands: { ...DEFAULT_COMMAND_KEYS, ...this.#stored.commands },
			kinds: this.#stored.kinds
		});
	}

	setCommand(command: Command, key: string): void {
		this.#write({ ...this.#stored, commands: { ...this.#stored.commands, [command]: key } });
	}

	setKind(kind: ErrorKind, key: string): void {
		this.#write({ ...this.#stored, kinds: { ...this.#stored.kinds, [kind]: key } });
	}

	usePad(pad: boolean): void {
		this.#write({ ...this.#stored, pad });
	}

	reset(): void {
		this.#write(NOTHING);
	}

	#write(stored: Stored): void {
		this.#stored = stored;
		localStorage.setItem(STORED, JSON.stringify(stored));
	}
}

function read(): Stored {
	const text = localStorage.getItem(STORED);
	return text ? { ...NOTHING, ...(JSON.parse(text) as Partial<Stored>) } : NOTHING;
}
