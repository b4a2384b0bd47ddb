/** One message of a server-sent event stream. */
export interface StreamMessage {
	/** position in the log; messages without one do not move the reader's place */
	id?: number;
	name?: string;
	data: unknown;
}

/** Sends one message, or several as one: a reader who begins is not behind, however long what it asked for is. */
export type Send = (messages: StreamMessage | readonly StreamMessage[]) => void;

/** Sends a slow reader may be behind before its connection is dropped; it comes back and asks for what it missed. */
const MOST_BEHIND = 2000;

/**
 * A response that stays open and carries messages (WHATWG HTML, server-sent events), with a heartbeat each second.
 *
 * @param open called once with what sends and what ends the stream; what it returns is called when the reader is gone
 * @param heartbeat the data of a heartbeat
 */
export function eventStream(open: (send: Send, end: () => void) => () => void, heartbeat: () => unknown): Response {
	const encoder = new TextEncoder();
	let close = () => {};
	const body = new ReadableStream<Uint8Array>(
		{
			start(controller) {
				let isOpen = true;
				let leave = () => {};
				const stop = (end: boolean) => {
					if (!isOpen) return;
					isOpen = false;
					clearInterval(beat);
					leave();
					if (end) controller.close();
				};
				const write = (text: string) => {
					if (!isOpen) return;
					if ((controller.desiredSize ?? 0) < -MOST_BEHIND) return stop(true);
					controller.enqueue(encoder.encode(text));
				};
				const send: Send = (messages) => write([messages].flat().map(format).join(''));
				const beat = setInterval(() => send({ name: 'heartbeat', data: heartbeat() }), 1000);
				close = () => stop(false);
				write('retry: 500\n\n');
				leave = open(send, () => stop(true));
				send({ name: 'heartbeat', data: heartbeat() });
			},
			cancel() {
				close();
			}
		},
		{ highWaterMark: 0 }
	);
	return new Response(body, {
		headers: {
			'content-type': 'text/event-stream',
			'cache-control': 'no-store, no-transform',
			'x-accel-buffering': 'no'
		}
	});
}

function format({ id, name, data }: StreamMessage): string {
	const lines = [`data: ${JSON.stringify(data)}`];
	if (name !== undefined) lines.unshift(`event: ${name}`);
	if (id !== undefined) lines.unshift(`id: ${id}`);
	return `${lines.join('\n')}\n\n`;
}
