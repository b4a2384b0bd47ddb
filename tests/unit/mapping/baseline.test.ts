import { describe, expect, test } from 'vitest';
import {
	baselineItems,
	baselineRate,
	baselineRounds,
	nextInRound,
	type BaselineItem
} from '../../../src/lib/mapping/baseline';
import type { EventData, EventType, LogEvent } from '../../../src/lib/mapping/events';
import { fold } from '../../../src/lib/mapping/fold';
import type { Score } from '../../../src/lib/mapping/vocabulary';

/** A log written by hand: two rounds of four items, and one trial of the mapping that is no part of them. */
class Log {
	readonly events: LogEvent[] = [];

	note<T extends EventType>(type: T, data: EventData[T]): string {
		const id = `entry-${this.events.length + 1}`;
		const at = '2026-05-04T09:00:00Z';
		this.events.push({ id, type, at, device: 'a', monotonic: 0, data, position: this.events.length + 1 } as never);
		return id;
	}

	answer(run: string | undefined, item: string, score: Score | null, said?: string): string {
		const trial = `${run ?? 'mapping'}-${item}-${this.events.length}`;
		this.note('trial-presented', {
			trial,
			item,
			task: 'object-naming',
			language: 'en',
			tag: run ? null : '1',
			stimulated: !run,
			milliamps: null,
			...(run ? { run } : {})
		});
		if (score !== null) this.note('trial-scored', { trial, score, corrects: [], ...(said ? { said } : {}) });
		return trial;
	}
}

function prepared(): Log {
	const log = new Log();
	log.note('items-copied', {
		set: 'objects',
		version: '1.0.0',
		task: 'object-naming',
		language: 'en',
		leadIn: null,
		items: ['anchor', 'kite', 'spoon', 'umbrella'].map((answer) => ({
			id: answer,
			answer,
			accepted: [],
			prompts: [{ kind: 'text', text: answer }]
		}))
	});
	log.note('run-opened', { run: 'one', purpose: 'baseline' });
	return log;
}

function byName(items: BaselineItem[]): Record<string, BaselineItem> {
	return Object.fromEntries(items.map((one) => [one.item.id, one]));
}

describe('the record of an item', () => {
	const log = prepared();
	log.answer('one', 'anchor', 'intact');
	log.answer('one', 'kite', 'intact');
	log.answer('one', 'spoon', 'delay');
	log.answer('one', 'umbrella', 'inattentive');
	log.note('run-closed', { run: 'one' });
	log.note('run-opened', { run: 'two', purpose: 'baseline' });
	log.answer('two', 'anchor', 'semantic-paraphasia', 'hook');
	log.answer('two', 'kite', 'intact');
	log.answer('two', 'umbrella', 'item-not-known');
	log.answer(undefined, 'kite', 'anomia');
	const state = fold(log.events);
	const items = byName(baselineItems(state));

	test('counts the rounds that were opened', () => {
		expect(baselineRounds(state)).toEqual(['one', 'two']);
	});

	test.each([
		['anchor', ['right', 'wrong'], 'drop'],
		['kite', ['right', 'right'], 'keep'],
		['spoon', ['wrong', undefined], 'drop'],
		['umbrella', ['not-counted', 'wrong'], 'drop']
	])('%s', (name, answers, proposal) => {
		expect(items[name]?.rounds.map((round) => round?.answer)).toEqual(answers);
		expect(items[name]?.proposal).toBe(proposal);
	});

	test('keeps what the patient said', () => {
		expect(items.anchor?.rounds[1]).toMatchObject({ said: 'hook', score: 'semantic-paraphasia' });
	});

	test('gives the errors of all answers that count', () => {
		expect(baselineRate(Object.values(items))).toMatchObject({ wrong: 3, counted: 6 });
	});
});

test('a withdrawn score leaves the item to be scored; without an answer there is no rate and no proposal', () => {
	const log = prepared();
	log.answer('one', 'anchor', 'intact');
	log.note('entry-withdrawn', { entry: log.events.at(-1)!.id });
	const items = baselineItems(fold(log.events));
	expect(items[0]).toMatchObject({ rounds: [{ answer: 'pending' }], proposal: null });
	expect(baselineRate(items)).toBeNull();
});

test('a round that was closed before its first item is none', () => {
	const log = prepared();
	log.note('run-closed', { run: 'one' });
	log.note('run-opened', { run: 'two', purpose: 'baseline' });
	expect(baselineRounds(fold(log.events))).toEqual(['two']);
});

test('an answer that counts is not given up for a later one in the same round', () => {
	const log = prepared();
	log.answer('one', 'anchor', 'not-scorable');
	log.answer('one', 'anchor', 'intact');
	log.answer('one', 'anchor', 'anomia');
	expect(baselineItems(fold(log.events))[0]?.rounds[0]).toMatchObject({ answer: 'right' });
});

describe('the next item of a round', () => {
	const log = prepared();
	log.answer('one', 'anchor', 'intact');
	log.answer('one', 'kite', 'not-scorable');
	log.note('item-decided', { item: 'spoon', task: 'object-naming', language: 'en', keep: false });
	const items = baselineItems(fold(log.events));

	test('is the first kept one without an answer', () => {
		expect(nextInRound(items, 0)?.item.id).toBe('umbrella');
	});

	test('comes back to what was skipped and what did not count, at the end', () => {
		expect(nextInRound(items, 0, new Set(['umbrella']))?.item.id).toBe('kite');
	});

	test('is none when every kept item has its answer', () => {
		log.answer('one', 'kite', 'intact');
		log.answer('one', 'umbrella', 'anomia');
		expect(nextInRound(baselineItems(fold(log.events)), 0)).toBeNull();
	});
});
