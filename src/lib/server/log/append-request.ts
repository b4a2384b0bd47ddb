import type { AnyCaseEvent } from '$lib/mapping/events';
import { REFUSALS } from '$lib/messages/refusals';
import { refusal, type Body } from '../answer';
import { faultOf } from './event-schema';

export const MOST_EVENTS = 500;
export const MOST_BYTES = 256 * 1024;

/**
 * Reads a request that appends. One bad event refuses the whole request and is named by its index and id.
 *
 * @param also a further check of an event that is otherwise good; returns what is wrong with it, or null
 */
export async function readAppend(
	request: Request,
	also: (event: AnyCaseEvent) => string | null
): Promise<Body<AnyCaseEvent[]>> {
	const bytes = await bytesOf(request);
	if (bytes === null) return refused(tooMuch());
	const body = bodyIn(bytes);
	if (body === undefined) return refused(refusal(400, REFUSALS.notJsonStored));
	const events = (body as { events?: unknown } | null)?.events;
	if (!Array.isArray(events)) return refused(refusal(422, REFUSALS.notAList));
	if (events.length > MOST_EVENTS) return refused(tooMuch());
	for (const [index, event] of events.entries()) {
		const fault = faultOf(event) ?? also(event as AnyCaseEvent);
		if (fault !== null) return refused(refusal(422, fault, { index, id: idOf(event) }));
	}
	return { ok: true, value: events as AnyCaseEvent[] };
}

function refused(response: Response): { ok: false; response: Response } {
	return { ok: false, response };
}

function tooMuch(): Response {
	return refusal(413, REFUSALS.tooMuch(MOST_EVENTS, MOST_BYTES / 1024));
}

/**
 * The body, or null when it is too long. It is read to its end even then: a body that is left unread blocks the
 * connection for the sender's next request. Beyond its own limit the adapter throws, and reads on by itself.
 */
async function bytesOf(request: Request): Promise<ArrayBuffer | null> {
	try {
		const bytes = await request.arrayBuffer();
		return bytes.byteLength > MOST_BYTES ? null : bytes;
	} catch (failure) {
		if ((failure as { status?: number }).status === 413) return null;
		throw failure;
	}
}

/** The JSON value, or undefined when it is none. */
function bodyIn(bytes: ArrayBuffer): unknown {
	try {
		return JSON.parse(new TextDecoder('utf-8', { fatal: true }).decode(bytes));
	} catch {
		return undefined;
	}
}

function idOf(event: unknown): unknown {
	return (event as { id?: unknown } | null)?.id;
}
