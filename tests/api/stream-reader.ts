import type { Stored } from './canonical';
import type { Client } from './client';
import { cookieOf } from './entries';

/** One message of a server-sent event stream, by the fields of the WHATWG HTML standard. */
export interface Message {
	id?: string;
	event?: string;
	data: string;
	/** milliseconds, when it was read */
	at: number;
}

/** Reads a stream of a case until it is closed. */
export class StreamReader {
	readonly messages: Message[] = [];
	readonly #abort = new AbortController();
	readonly #done: Promise<void>;
	#wake = () => {};
	#ended = false;

	private constructor(readonly response: Response) {
		this.#done = this.#read();
	}

	static async open(client: Client, path: string, headers: Record<string, string> = {}): Promise<StreamReader> {
		const abort = new AbortController();
		const init = { headers: { ...cookieOf(client), ...headers }, signal: abort.signal };
		const response = await fetch(client.url + path, init);
		const reader = new StreamReader(response);
		reader.#abort.signal.addEventListener('abort', () => abort.abort());
		return reader;
	}

	/** Entries of the case log so far. */
	get entries(): Stored[] {
		return this.messages.filter(({ id }) => id !== undefined).map(({ data }) => JSON.parse(data) as Stored);
	}

	/** Waits until the messages satisfy a condition, or throws after some seconds. */
	async until(condition: (reader: StreamReader) => boolean, seconds = 10): Promise<this> {
		const late = Date.now() + seconds * 1000;
		while (!condition(this)) {
			if (this.#ended) throw new Error(`the stream ended after ${this.entries.length} entries`);
			if (Date.now() > late) throw new Error(`not within ${seconds} s; ${this.entries.length} entries came`);
			await new Promise<void>((resolve) => {
				this.#wake = resolve;
				setTimeout(resolve, 100);
			});
		}
		return this;
	}

	async close(): Promise<void> {
		this.#abort.abort();
		await this.#done;
	}

	async #read(): Promise<void> {
		let rest = '';
		const decoder = new TextDecoder();
		try {
			for await (const chunk of this.response.body ?? []) {
				const parts = (rest + decoder.decode(chunk as Uint8Array, { stream: true })).split('\n\n');
				rest = parts.pop() ?? '';
				for (const part of parts) this.#take(part);
				this.#wake();
			}
		} catch (failure) {
			if (!this.#abort.signal.aborted && (failure as Error).name !== 'TypeError') throw failure;
		}
		this.#ended = true;
		this.#wake();
	}

	#take(part: string): void {
		const fields = new Map<string, string>();
		for (const line of part.split('\n')) {
			const [, name = '', value = ''] = /^([a-z]*): ?(.*)$/.exec(line) ?? [];
			fields.set(name, fields.has(name) ? `${fields.get(name)}\n${value}` : value);
		}
		const data = fields.get('data');
		if (data === undefined) return;
		this.messages.push({ id: fields.get('id'), event: fields.get('event'), data, at: performance.now() });
	}
}
