/** One message of a server-sent event stream. */
export interface StreamMessage {
	/** position in the log; messages without one do not move the reader's place */
	id?: number;
	name?: string;
	data: unknown;
}

/** Messages a slow reader may be behind before its connection is dropped; it comes back and asks for what it missed. */
const MOST_BEHIND = 2000;

/**
 * A response that stays open and carries messages (WHATWG HTML, server-sent events), with a heartbeat each second.
 *
 * @param open called once with the functions that send and that end the stream; what it returns is called when the
 *   stream has ended, whoever ended it
 * @param heartbeat the data of a heartbeat
 */
export function eventStream(
	open: (send: (message: StreamMessage) => void, end: () => void) => () => void,
	heartbeat: () => unknown
): Response {
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
				const send = (message: StreamMessage) => write(format(message));
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
