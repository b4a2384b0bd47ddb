import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { DEFAULT_PROTOCOL } from '../../../src/lib/mapping/protocol';
import { protocolChange } from '../../../src/lib/mapping/protocol-change';
import { faultOf } from '../../../src/lib/server/log/event-schema';
import { draftOf, readDraft, type ProtocolDraft } from '../../../src/routes/(team)/cases/[code]/protocol-draft';

const draft = (change: Partial<ProtocolDraft>) => readDraft({ ...draftOf(DEFAULT_PROTOCOL), ...change });

test('an untouched draft changes nothing', () => {
	const read = readDraft(draftOf(DEFAULT_PROTOCOL));
	expect('protocol' in read && protocolChange(DEFAULT_PROTOCOL, read.protocol)).toBeNull();
});

test('reads seconds with a point or a comma; an empty time on the screen is until it is taken off', () => {
	expect(draft({ shown: '2,5', pause: '0.5' })).toMatchObject({ protocol: { timing: { shown: 2500, pause: 500 } } });
	expect(draft({ shown: ' ' })).toMatchObject({ protocol: { timing: { shown: null } } });
});

describe('names what does not fit', () => {
	test.each<[Partial<ProtocolDraft>, string]>([
		[{ minTrials: '0' }, 'minTrials'],
		[{ minTrials: '2.5' }, 'minTrials'],
		[{ minTrials: '' }, 'minTrials'],
		[{ part: '4', whole: '3' }, 'share'],
		[{ part: '0' }, 'share'],
		[{ shown: '0' }, 'shown'],
		[{ shown: 'four' }, 'shown'],
		[{ pause: '' }, 'pause'],
		[{ pause: '-1' }, 'pause'],
		[{ lead: '2001' }, 'lead']
	])('%j', (change, field) => {
		const read = draft(change);
		expect('faults' in read && Object.keys(read.faults)).toEqual([field]);
	});
});

test('whatever a draft passes, the case log takes', () => {
	const event = { id: '01a2323b-8fe5-770d-afa8-3011e86cfe95', type: 'protocol-set', at: '2026-05-04T09:00:00Z' };
	const near = (from: number, to: number) =>
		fc.oneof(
			{ weight: 6, arbitrary: fc.integer({ min: from - 1, max: to + 1 }).map(String) },
			{ weight: 1, arbitrary: fc.double({ min: from, max: to, noNaN: true }).map(String) },
			{ weight: 1, arbitrary: fc.string() }
		);
	let passed = 0;
	fc.assert(
		fc.property(near(1, 20), near(1, 100), near(0, 600), near(0, 2000), (minTrials, part, seconds, lead) => {
			const read = draft({ minTrials, part, whole: '100', shown: seconds, pause: seconds, lead });
			if ('faults' in read) return;
			passed++;
			expect(faultOf({ ...event, device: 'a', monotonic: 0, data: read.protocol })).toBeNull();
		}),
		{ numRuns: 500 }
	);
	expect(passed).toBeGreaterThan(50);
});
