import { v7 } from 'uuid';
import type { AnyCaseEvent, EventData, EventType } from '../../src/lib/mapping/events';
import type { Client } from './client';
import type { Member } from './server';

/** A new case with others on its team; its code. */
export async function newCase(creator: Member, ...others: Member[]): Promise<string> {
	const team = others.map(({ id }) => id);
	const made = await creator.client.post('/api/cases', { hemisphere: 'left', languages: ['en'], team });
	if (made.status !== 201) throw new Error(`a new case was answered with ${made.status}: ${made.text}`);
	return made.body.code;
}

/** What a client sends to stay signed in, for a request it cannot make itself. */
export function cookieOf(client: Client): { cookie: string } {
	return { cookie: [...client.cookies].map(([name, value]) => `${name}=${value}`).join('; ') };
}

/** One entry as a device would make it. */
export function made<T extends EventType>(
	type: T,
	data: EventData[T],
	other: Partial<AnyCaseEvent> = {}
): AnyCaseEvent {
	const base = { id: v7(), type, at: '2031-03-05T12:00:00.000+01:00', device: 'examiner', monotonic: 12.5, data };
	return { ...base, ...other } as AnyCaseEvent;
}

/** Trials at one tag, presented and scored; null leaves one without a score. */
export function trials(
	scores: readonly (EventData['trial-scored']['score'] | null)[],
	other: Partial<EventData['trial-presented']> = {}
): AnyCaseEvent[] {
	return scores.flatMap((score) => {
		const trial = v7();
		const presented = made('trial-presented', {
			trial,
			item: 'house',
			task: 'object-naming',
			language: 'en',
			tag: '7',
			stimulated: true,
			milliamps: 2.5,
			...other
		});
		return score === null ? [presented] : [presented, made('trial-scored', { trial, score, corrects: [] })];
	});
}
