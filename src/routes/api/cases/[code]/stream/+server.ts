import { eventStream, type Send } from '$lib/server/live/event-stream';
import { accountRoom, hub, staffRoom } from '$lib/server/live/hub';
import { lastHeard } from '$lib/server/live/presence';
import { BOOT, serverNow } from '$lib/server/live/server-clock';
import { entriesAfter, type StoredEvent } from '$lib/server/log/log';
import { positionOf } from '$lib/server/log/position';
import type { RequestHandler } from './$types';

/** The case log from a position on, then every entry as it is stored; what only passes has a name and no id. */
export const GET: RequestHandler = async ({ locals, url, request }) => {
	const { code } = locals.case;
	const after = positionOf(request.headers.get('last-event-id') ?? url.searchParams.get('after'));
	if (!after.ok) return after.response;
	let reached = after.position;

	const follow = (send: Send, end: () => void) => {
		let missed: StoredEvent[] | null = [];
		const deliver = (events: StoredEvent[]) => {
			const fresh = events.filter(({ position }) => position > reached);
			reached = fresh.at(-1)?.position ?? reached;
			if (fresh.length > 0) send(fresh.map((event) => ({ id: event.position, data: event })));
		};
		// Listen first, then read: what is stored in between waits its turn.
		const leaveCase = hub.listen(staffRoom(code), {
			entries: (events) => (missed ? missed.push(...events) : deliver(events)),
			passing: ({ name, data }) => send({ name, data })
		});
		const leaveAccount = hub.listen(accountRoom(locals.account!.id), { passing: end });
		for (const data of lastHeard(code)) send({ name: 'presence', data });
		entriesAfter(code, reached).then(
			(events) => {
				deliver(events);
				deliver(missed ?? []);
				missed = null;
			},
			(failure: unknown) => {
				// Heartbeats without entries would look like a log in which nothing happens.
				console.error('stream', code, failure);
				end();
			}
		);
		return () => {
			leaveCase();
			leaveAccount();
		};
	};

	return eventStream(follow, () => ({ now: serverNow(), boot: BOOT, position: reached }));
};
