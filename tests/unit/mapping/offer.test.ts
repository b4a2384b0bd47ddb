/** Which items a case has, in which order they come, and which one is offered next. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { caseItems, preparedTasks } from '../../../src/lib/mapping/case-items';
import type { EventData, LogEvent } from '../../../src/lib/mapping/events';
import { fold } from '../../../src/lib/mapping/fold';
import { nextItem, stayingItem } from '../../../src/lib/mapping/offer';
import { shuffle } from '../../../src/lib/mapping/shuffle';
import { entry, received } from './entry';

function copied(ids: string[], other: Partial<EventData['items-copied']> = {}): LogEvent {
	return entry('items-copied', {
		set: 'objects',
		version: '1',
		task: 'object-naming',
		language: 'en',
		leadIn: 'This is a',
		items: ids.map((id) => ({ id, answer: id, accepted: [], prompts: [{ kind: 'text', text: id }] })),
		...other
	});
}

function decided(item: string, keep: boolean, other: Partial<EventData['item-decided']> = {}): LogEvent {
	return entry('item-decided', { item, task: 'object-naming', language: 'en', keep, ...other });
}

let presentations = 0;
function shown(item: string | null, tag: string | null, other: Partial<EventData['trial-presented']> = {}): LogEvent {
	const trial = `trial-${++presentations}`;
	const usual = { task: 'object-naming', language: 'en', stimulated: tag !== null, milliamps: 2 };
	return entry('trial-presented', { trial, item, tag, ...usual, ...other });
}

function caseOf(...entries: LogEvent[]) {
	return fold(received(entries));
}

const naming = { task: 'object-naming', language: 'en' };

function offered(entries: LogEvent[], at: { tag?: string | null; language?: string }, skipped: string[] = []) {
	const state = caseOf(...entries);
	const offer = nextItem(state, caseItems(state), { ...naming, ...at }, new Set(skipped));
	return offer && `${offer.item.id}${offer.again ? ' again' : ''}`;
}

describe('the items of a case', () => {
	const items = (...entries: LogEvent[]) => caseItems(caseOf(...entries));
	const kept = (...entries: LogEvent[]) =>
		items(...entries).map(({ id, kept }) => `${id} ${kept ? 'kept' : 'dropped'}`);

	it('are those copied, in their order, with what their set says', () => {
		expect(items(copied(['sun', 'moon']))).toEqual(
			['sun', 'moon'].map((id) => ({
				id,
				answer: id,
				accepted: [],
				prompts: [{ kind: 'text', text: id }],
				task: 'object-naming',
				language: 'en',
				set: 'objects',
				version: '1',
				leadIn: 'This is a',
				kept: true,
				reason: null
			}))
		);
	});

	it('are kept until somebody drops them; the last decision holds and can be withdrawn', () => {
		const dropped = decided('sun', false, { reason: 'missed in round 1' });
		const back = { ...decided('sun', true), id: 'kept again' };
		const withdrawn = entry('entry-withdrawn', { entry: 'kept again' });
		expect(kept(copied(['sun', 'moon']), dropped)).toEqual(['sun dropped', 'moon kept']);
		expect(items(copied(['sun']), dropped)[0]).toMatchObject({ reason: 'missed in round 1' });
		expect(kept(copied(['sun']), dropped, back)).toEqual(['sun kept']);
		expect(items(copied(['sun']), dropped, back)[0]).toMatchObject({ reason: null });
		expect(kept(copied(['sun']), dropped, back, withdrawn)).toEqual(['sun dropped']);
	});

	it('a decision may come before the item it names, and stays when the item is copied again', () => {
		expect(kept(decided('sun', false), copied(['sun']))).toEqual(['sun dropped']);
		const again = copied(['sun'], { version: '2' });
		expect(items(copied(['sun']), decided('sun', false), again)).toMatchObject([{ version: '2', kept: false }]);
	});

	it('a decision is about one task and language alone', () => {
		const german = copied(['sun'], { language: 'de' });
		expect(kept(copied(['sun']), german, decided('sun', false, { language: 'de' }))).toEqual([
			'sun kept',
			'sun dropped'
		]);
		expect(preparedTasks(items(copied(['sun', 'moon']), german))).toEqual([naming, { ...naming, language: 'de' }]);
	});

	it('are gone when their copy is withdrawn', () => {
		const copy = copied(['sun']);
		expect(items(copy, entry('entry-withdrawn', { entry: copy.id }))).toEqual([]);
	});
});

describe('the next item', () => {
	const set = copied(['sun', 'moon', 'star']);

	it('is the first in order, then the one shown least often', () => {
		expect(offered([set], { tag: '7' })).toBe('sun');
		expect(offered([set, shown('sun', '7')], { tag: '8' })).toBe('moon');
		expect(offered([set, shown('moon', '1'), shown('sun', '2')], { tag: '8' })).toBe('star');
		const all = ['sun', 'sun', 'moon', 'star', 'star'].map((item) => shown(item, '1'));
		expect(offered([set, ...all], { tag: '8' })).toBe('moon');
		expect(offered([set, shown('sun', '1')], {})).toBe('moon');
		expect(offered([set, shown('sun', '1')], { tag: null })).toBe('moon');
	});

	it('is none seen at this tag, in whichever language, while others remain', () => {
		const german = copied(['sun', 'moon', 'star'], { language: 'de' });
		const elsewhere = ['moon', 'moon', 'star'].map((item) => shown(item, '1'));
		expect(offered([set, shown('sun', '7'), ...elsewhere], { tag: '7' })).toBe('star');
		expect(offered([set, german, shown('sun', '7', { language: 'de' }), ...elsewhere], { tag: '7' })).toBe('star');
		expect(offered([set, german, shown('sun', '7'), ...elsewhere], { tag: '7', language: 'de' })).toBe('star');
	});

	it('comes again, and says so, when every item was seen at this tag', () => {
		const seen = ['sun', 'moon', 'star', 'sun'].map((item) => shown(item, '7'));
		expect(offered([set, ...seen], { tag: '7' })).toBe('moon again');
		expect(offered([set, ...seen], { tag: '8' })).toBe('moon');
	});

	it('counts what the patient saw: not a presentation withdrawn, nor one that was not shown', () => {
		const trial = shown('sun', '7');
		const { trial: name } = trial.data as EventData['trial-presented'];
		const rest = [shown('moon', '7'), shown('star', '7')];
		expect(offered([set, trial, ...rest], { tag: '7' })).toBe('sun again');
		expect(offered([set, trial, ...rest, entry('trial-onset', { trial: name, shown: false })], { tag: '7' })).toBe(
			'sun'
		);
		expect(offered([set, trial, ...rest, entry('entry-withdrawn', { entry: trial.id })], { tag: '7' })).toBe('sun');
		expect(offered([set, trial, ...rest, entry('trial-corrected', { trial: name, tag: '8' })], { tag: '7' })).toBe(
			'sun'
		);
	});

	it('does not count the baseline rounds', () => {
		const baseline = entry('run-opened', { run: 'b', purpose: 'baseline' });
		expect(offered([set, baseline, shown('sun', null, { run: 'b' })], { tag: '7' })).toBe('sun');
	});

	it('leaves out what is skipped while others remain, and never offers what was dropped', () => {
		expect(offered([set], { tag: '7' }, ['sun'])).toBe('moon');
		expect(offered([set], { tag: '7' }, ['sun', 'moon', 'star'])).toBe('sun');
		expect(offered([set, decided('sun', false)], { tag: '7' })).toBe('moon');
		expect(offered([set, ...['sun', 'moon', 'star'].map((id) => decided(id, false))], { tag: '7' })).toBeNull();
		expect(offered([set], { tag: '7', language: 'fr' })).toBeNull();
	});

	it('runs through a whole set at one tag before any item comes again', () => {
		fc.assert(
			fc.property(
				fc.uniqueArray(fc.string({ minLength: 1 }), { minLength: 1, maxLength: 12 }),
				fc.nat(),
				(ids, seed) => {
					const entries = [copied(ids)];
					const seen: string[] = [];
					for (let turn = 0; turn < ids.length; turn++) {
						const state = caseOf(...entries);
						const offer = nextItem(state, shuffle(caseItems(state), seed), { ...naming, tag: '7' })!;
						expect(offer.again).toBe(false);
						seen.push(offer.item.id);
						entries.push(shown(offer.item.id, '7'));
					}
					expect(seen.sort()).toEqual([...ids].sort());
				}
			),
			{ numRuns: 100, seed: 7 }
		);
	});
});

describe('a shuffled order', () => {
	it('is a permutation, the same for the same seed, and leaves what it is given alone', () => {
		fc.assert(
			fc.property(fc.array(fc.nat(), { maxLength: 50 }), fc.integer(), (values, seed) => {
				const given = Object.freeze([...values]);
				const once = shuffle(given, seed);
				expect([...once].sort()).toEqual([...values].sort());
				expect(shuffle(given, seed)).toEqual(once);
			}),
			{ numRuns: 500, seed: 7 }
		);
	});

	it('differs from seed to seed', () => {
		const values = Array.from({ length: 20 }, (_, index) => index);
		const orders = new Set(Array.from({ length: 1000 }, (_, seed) => shuffle(values, seed).join()));
		expect(orders.size).toBe(1000);
	});

	/**
	 * Pearson's chi-square against equal frequencies. Upper 0.1 % points of chi-square with 23 and 64 degrees of freedom:
	 * NIST/SEMATECH e-Handbook of Statistical Methods, 1.3.6.7.4.
	 */
	const LIMIT_23 = 49.728;
	const LIMIT_64 = 104.716;
	function chiSquare(counts: number[]): number {
		const expected = counts.reduce((sum, count) => sum + count) / counts.length;
		return counts.reduce((sum, count) => sum + (count - expected) ** 2 / expected, 0);
	}

	it('gives each of the 24 orders of four items equally often, over the seeds 0 to 23 999', () => {
		const counts = new Map<string, number>();
		for (let seed = 0; seed < 24_000; seed++) {
			const order = shuffle('abcd'.split(''), seed).join('');
			counts.set(order, (counts.get(order) ?? 0) + 1);
		}
		expect(counts.size).toBe(24);
		expect(chiSquare([...counts.values()])).toBeLessThan(LIMIT_23);
	});

	it('puts each of nine items in each place equally often, over seeds far apart', () => {
		const counts = Array.from({ length: 81 }, () => 0);
		const values = Array.from({ length: 9 }, (_, index) => index);
		for (let turn = 0; turn < 9000; turn++) {
			shuffle(values, Math.imul(turn, 0x9e3779b1)).forEach((value, place) => counts[value * 9 + place]!++);
		}
		// The sums of rows and columns are fixed: 64 degrees of freedom. Cells of one permutation exclude each other, which
		// widens every free direction by 9/8 (the variance of a cell is 1/8 of its share there, not 1/9).
		expect((chiSquare(counts) * 8) / 9).toBeLessThan(LIMIT_64);
	});
});

describe('the prompt of a running task', () => {
	const counting = { task: 'counting', language: 'en' };
	const series = copied(['up', 'down', 'days'], counting);
	const inCounting = { ...counting };

	function prompt(entries: LogEvent[], showing: string | null, skipped: string[] = []) {
		const state = caseOf(...entries);
		return stayingItem(state, caseItems(state), counting, showing, new Set(skipped))?.item.id ?? null;
	}

	it('is the first that was copied before any trial', () => {
		expect(prompt([series], null)).toBe('up');
	});

	it('is the one that stands on the patient view', () => {
		expect(prompt([series, shown('up', '1', inCounting)], 'days')).toBe('days');
	});

	it('is the one of the last trial when the task is taken up again', () => {
		const entries = [series, shown('up', '1', inCounting), shown('down', '2', inCounting), shown('dog', '3')];
		expect(prompt(entries, 'dog')).toBe('down');
	});

	it('is the next one once it is skipped, and begins again when all are', () => {
		expect(prompt([series, shown('up', '1', inCounting)], 'up', ['up'])).toBe('down');
		expect(prompt([series], null, ['up', 'down', 'days'])).toBe('up');
	});

	it('is never one that was dropped, nor of another language', () => {
		const dropped = decided('up', false, counting);
		expect(prompt([series, dropped], 'up')).toBe('down');
		expect(prompt([copied(['eins'], { ...counting, language: 'de' })], null)).toBeNull();
	});
});
