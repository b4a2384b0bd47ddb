import type { ErrorKind } from '$lib/mapping/vocabulary';
import { assignKeys, changeCommandKey, commandWith, DEFAULT_COMMAND_KEYS, type Command, type KeyMap } from './keys';

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
		return assignKeys(kinds, { commands: this.#commands, kinds: this.#stored.kinds });
	}

	/** Sets the key of a command; the command that had it takes the old one in exchange. */
	setCommand(command: Command, key: string): void {
		this.#write({ ...this.#stored, commands: changeCommandKey(this.#commands, command, key) });
	}

	/** Sets the key of a kind; a kind that had it gets another. The key of a command is refused. */
	setKind(kind: ErrorKind, key: string): { refused: Command | null } {
		const command = commandWith(this.#commands, key);
		if (command) return { refused: command };
		const others = Object.entries(this.#stored.kinds).filter(([, taken]) => taken !== key);
		this.#write({ ...this.#stored, kinds: { ...Object.fromEntries(others), [kind]: key } });
		return { refused: null };
	}

	get #commands(): Record<Command, string> {
		return { ...DEFAULT_COMMAND_KEYS, ...this.#stored.commands };
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
