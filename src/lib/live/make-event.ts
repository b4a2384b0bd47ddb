import { v7 } from 'uuid';
import type { AnyCaseEvent, EventData, EventType } from '$lib/mapping/events';
import { BOOT } from './device';
import type { ServerClock } from './server-clock.svelte';

/** Makes an entry as this device sees it now. */
export function makeEvent<T extends EventType>(
	type: T,
	data: EventData[T],
	device: string,
	clock: ServerClock
): AnyCaseEvent {
	const event = {
		id: v7(),
		type,
		v: 1 as const,
		at: new Date(clock.now()).toISOString(),
		device,
		monotonic: performance.now(),
		data,
		clock: new Date().toISOString(),
		boot: BOOT,
		...(clock.uncertainty === null ? {} : { uncertainty: clock.uncertainty })
	};
	return event as unknown as AnyCaseEvent;
}
