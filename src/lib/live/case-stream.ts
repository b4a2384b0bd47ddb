import type { LogEvent } from '$lib/mapping/events';

/** What a server says each second. */
export interface Heartbeat {
	now: number;
	boot: string;
}

export interface StreamListener {
	entry?(event: LogEvent): void;
	heartbeat?(beat: Heartbeat): void;
	/** what passes without being kept, by the name of its message */
	passing?: Record<string, (data: never) => void>;
}

const RETRY = 1000;

/**
 * Follows a server-sent event stream for as long as the page wants it: the browser comes back by itself after a cut;
 * after an answer that ends a stream for good (signed out, server gone behind a proxy) this comes back too.
 *
 * @param address the address to open, asked anew each time, so that it can name the place reached
 * @returns a function that ends it
 */
export function followStream(address: () => string, listener: StreamListener): () => void {
	let source: EventSource | undefined;
	let timer: ReturnType<typeof setTimeout> | undefined;
	let ended = false;

	const open = () => {
		if (ended) return;
		source = new EventSource(address());
		source.onmessage = ({ data }) => listener.entry?.(JSON.parse(data as string) as LogEvent);
		source.addEventListener('heartbeat', ({ data }) => listener.heartbeat?.(JSON.parse(data as string) as Heartbeat));
		for (const [name, hear] of Object.entries(listener.passing ?? {})) {
			source.addEventListener(name, ({ data }) => hear(JSON.parse(data as string) as never));
		}
		source.onerror = () => {
			if (source?.readyState !== EventSource.CLOSED) return;
			timer = setTimeout(open, RETRY);
		};
	};
	open();

	return () => {
		ended = true;
		clearTimeout(timer);
		source?.close();
	};
}
