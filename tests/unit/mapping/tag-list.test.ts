import { describe, expect, test } from 'vitest';
import { nameForNewSpot, nextNumber, parseTags } from '../../../src/lib/mapping/tag-list';

describe('tags written in a row', () => {
	test.each([
		['1 to 12', ['1', '2', '3', '4', '5', '6', '7', '8', '9', '10', '11', '12']],
		['1-3', ['1', '2', '3']],
		['1–3, 7b;A', ['1', '2', '3', '7B', 'A']],
		['8 to 10 3 9', ['8', '9', '10', '3']],
		['5 to 5', ['5']],
		['', []]
	])('%s', (text, tags) => {
		expect(parseTags(text)).toEqual({ tags, faults: [] });
	});

	test.each([
		['0', ['0']],
		['12345', ['12345']],
		['3 to 1', ['3 to 1']],
		['0 to 4', ['0 to 4']],
		['1 to 1000', ['1 to 1000']],
		['4, x!, 5', ['x!']]
	])('names what is no tag in %s', (text, faults) => {
		expect(parseTags(text).faults).toEqual(faults);
	});
});

describe('a number that is used again', () => {
	test.each([
		['7', ['7'], '7B'],
		['7', ['7', '7B'], '7C'],
		['7B', ['7', '7B'], '7C'],
		['12', ['12'], '12B'],
		['A', ['A'], 'A2'],
		['123', ['123'], null]
	])('%s with %j used becomes %s', (tag, used, name) => {
		expect(nameForNewSpot(tag, new Set(used))).toBe(name);
	});
});

test.each([
	[[], '1'],
	[['1', '2', '10'], '11'],
	[['7', '7B', 'A'], '8'],
	[['A'], '1']
])('the number after %j is %s', (used, next) => {
	expect(nextNumber(used)).toBe(next);
});
