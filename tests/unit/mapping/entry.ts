import type { EventData, EventType, LogEvent } from '../../../src/lib/mapping/events';

const NOON = Date.parse('2031-03-05T12:00:00Z');

/** RFC 3339, so many seconds after noon of an invented day, written with the offset of one zone or another. */
export function time(seconds: number, offset: 'Z' | '+02:00' | '-05:00' = 'Z'): string {
	const hours = { Z: 0, '+02:00': 2, '-05:00': -5 }[offset];
	return new Date(NOON + seconds * 1000 + hours * 3_600_000).toISOString().replace('Z', offset);
}

/** One entry as a device makes it, without the server's receipt. */
export function entry<T extends EventType>(type: T, data: EventData[T], other: Partial<LogEvent> = {}): LogEvent {
	return {
		id: `${type}-${JSON.stringify(data)}`,
		type,
		at: time(0),
		device: 'examiner',
		monotonic: 0,
		data,
		...other
	} as LogEvent;
}

/** The entries as the log has them: positions 1 to n in their order; one that is sent again keeps its position. */
export function received(entries: readonly LogEvent[]): LogEvent[] {
	const positions = new Map<string, number>();
	return entries.map((event) => {
		const position = positions.get(event.id) ?? positions.size + 1;
		positions.set(event.id, position);
		return {
			...event,
			position,
			receivedAt: time(position),
			sender: `account-${event.device}`,
			hash: `hash-${position}`
		};
	});
}

/** The entries as their devices hold them while they wait to be sent. */
export function waiting(entries: readonly LogEvent[]): LogEvent[] {
	return entries.map((event) => {
		const copy = { ...event };
		delete copy.position;
		delete copy.receivedAt;
		delete copy.sender;
		delete copy.hash;
		return copy;
	});
}
