import { expect, test } from 'vitest';
import type { CaseItem, EventData } from '../../../src/lib/mapping/events';
import { faultOf } from '../../../src/lib/server/log/event-schema';
import { inParts } from '../../../src/routes/(team)/cases/[code]/copy-items';

function setOf(count: number, text: string): EventData['items-copied'] {
	const items = Array.from({ length: count }, (_, i): CaseItem => ({
		id: `item-${i}`,
		answer: 'dog',
		accepted: [],
		prompts: [{ kind: 'text', text }]
	}));
	return { set: 'objects', version: '1.0.0', task: 'object-naming', language: 'en', leadIn: null, items };
}

/** What one request may hold, by the contract of the case log. */
const MOST_BYTES = 256 * 1024;

test.each([
	['a small set stays whole', setOf(142, 'a picture'), 1],
	['more items than one entry takes', setOf(900, 'a picture'), 3],
	['long texts in letters of three bytes', setOf(200, '語'.repeat(1000)), 5]
])('%s', (_, copy, count) => {
	const parts = inParts(copy);
	expect(parts).toHaveLength(count);
	expect(parts.flatMap(({ items }) => items)).toEqual(copy.items);
	for (const data of parts) {
		const event = {
			id: '01a2323b-8fe5-770d-afa8-3011e86cfe95',
			type: 'items-copied',
			at: '2026-05-04T09:00:00Z',
			device: 'a',
			monotonic: 0,
			data
		};
		expect(faultOf(event)).toBeNull();
		expect(Buffer.byteLength(JSON.stringify({ events: [event] }))).toBeLessThan(MOST_BYTES);
	}
});
