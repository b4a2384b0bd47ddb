import { json } from '@sveltejs/kit';
import type { AnyCaseEvent } from '$lib/mapping/events';
import { REFUSALS } from '$lib/messages/refusals';
import { refusal } from '../answer';
import { append, IdTaken } from './log';

/** Appends checked events and answers with where they stand. */
export async function store(code: string, sender: string, events: AnyCaseEvent[]): Promise<Response> {
	try {
		return json({ stored: await append(code, sender, events) });
	} catch (failure) {
		if (!(failure instanceof IdTaken)) throw failure;
		return refusal(409, REFUSALS.idTaken, {
			index: failure.index,
			id: failure.id
		});
	}
}
