import type { EventData, EventType, LogEvent } from '../../../src/lib/mapping/events';
import { fold } from '../../../src/lib/mapping/fold';
import type { Score } from '../../../src/lib/mapping/vocabulary';

const SCORES: Record<string, Score> = { i: 'intact', d: 'anomia', v: 'not-scorable', m: 'dysarthria' };
export const START = Date.parse('2026-05-04T09:00:00Z');

/** Writes a case log in few words: every entry comes one second after the one before it. */
export class CaseLog {
	readonly events: LogEvent[] = [];

	note<T extends EventType>(type: T, data: EventData[T], device = 'examiner'): string {
		const position = this.events.length + 1;
		const at = new Date(START + position * 1000).toISOString();
		const id = `entry-${position}`;
		this.events.push({ id, type, data, at, device, monotonic: 0, position, receivedAt: at } as unknown as LogEvent);
		return id;
	}

	/** Trials at a tag, one a letter: i intact, d anomia, m dysarthria, v not scorable, ? without a score. */
	trials(tag: string | null, letters: string, given: Partial<EventData['trial-presented']> = {}): string[] {
		return [...letters].map((letter) => {
			const trial = `trial-${this.events.length + 1}`;
			this.note('trial-presented', {
				trial,
				item: 'cat',
				task: 'object-naming',
				language: 'en',
				tag,
				stimulated: tag !== null,
				milliamps: 3,
				...given
			});
			const score = SCORES[letter];
			if (score) this.note('trial-scored', { trial, score, corrects: [] });
			return trial;
		});
	}

	get state() {
		return fold(this.events);
	}
}
