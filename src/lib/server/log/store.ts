import { json } from '@sveltejs/kit';
import type { AnyCaseEvent } from '$lib/mapping/events';
import { refusal } from '../answer';
import { hub, staffRoom } from '../live/hub';
import { append, IdTaken } from './log';

/** Appends checked events, tells everybody who watches the case, and answers with where they stand. */
export async function store(code: string, sender: string, events: AnyCaseEvent[]): Promise<Response> {
	try {
		const { stored, added } = await append(code, sender, events);
		if (added.length > 0) hub.entries(staffRoom(code), added);
		return json({ stored });
	} catch (failure) {
		if (!(failure instanceof IdTaken)) throw failure;
		return refusal(409, 'This id stands in the case log with other content. Nothing was stored.', {
			index: failure.index,
			id: failure.id
		});
	}
}
