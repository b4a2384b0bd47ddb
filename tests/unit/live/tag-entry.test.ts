import { describe, expect, test } from 'vitest';
import { chosenTag, TAG_PAUSE, typeTag, type TagEntry } from '$lib/live/tag-entry';

const TAGS = ['1', '2', '7', '7B', '12', 'A', 'A2'];

/** What stands after characters typed with a wait, in milliseconds, before each. */
function typed(characters: string, waits: number[] = []): string | null {
	let entry: TagEntry | null = null;
	let at = 0;
	for (const [index, character] of [...characters].entries()) {
		at += waits[index] ?? 100;
		entry = typeTag(entry, character, at, TAGS);
	}
	return chosenTag(entry, TAGS);
}

describe('a tag that is typed', () => {
	test('is one digit, two digits, a digit and a letter, or letters', () => {
		for (const tag of TAGS) expect(typed(tag)).toBe(tag);
	});

	test('begins anew where the longer one is no tag: the last one typed holds', () => {
		expect(typed('72')).toBe('2');
		expect(typed('127')).toBe('7');
		expect(typed('1212')).toBe('12');
	});

	test('begins anew after a pause, and not before', () => {
		expect(typed('12', [0, TAG_PAUSE])).toBe('12');
		expect(typed('12', [0, TAG_PAUSE + 1])).toBe('2');
	});

	test('is none while it is not laid, and never another one', () => {
		expect(typed('3')).toBeNull();
		expect(typed('B')).toBeNull();
		expect(typed('0')).toBeNull();
		expect(typed('79')).toBeNull();
		expect(chosenTag(null, TAGS)).toBeNull();
	});
});
