import { eventStream } from '$lib/server/live/event-stream';
import { hub, patientRoom } from '$lib/server/live/hub';
import { hear } from '$lib/server/live/presence';
import { BOOT, serverNow } from '$lib/server/live/server-clock';
import type { RequestHandler } from './$types';

/** Display messages for one patient view, and nothing else. */
export const GET: RequestHandler = ({ locals }) => {
	const view = locals.patientView!;
	const room = patientRoom(view.id);
	return eventStream(
		(send) => {
			const leave = hub.listen(room, { passing: ({ name, data }) => send({ name, data }) });
			return () => {
				leave();
				if (hub.count(room) > 0) return;
				hear(view.case, { kind: 'patient', heardAt: serverNow(), view: view.id, connected: false });
			};
		},
		() => ({ now: serverNow(), boot: BOOT })
	);
};
