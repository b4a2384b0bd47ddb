import { describe, expect, test } from 'vitest';
import { allLanguages, findLanguages } from '../../../src/lib/messages/languages';

describe('languages by name', () => {
	test('has every two-letter language once, under a name', () => {
		const tags = allLanguages().map(({ tag }) => tag);
		// Spot checks against ISO 639-1: living languages are there, codes it withdrew (iw, in, ji) are not.
		for (const tag of ['de', 'en', 'ja', 'sw', 'tr', 'yi']) expect(tags).toContain(tag);
		for (const tag of ['iw', 'in', 'ji', 'xx']) expect(tags).not.toContain(tag);
		expect(new Set(tags).size).toBe(tags.length);
		expect(allLanguages().filter(({ tag, name }) => tag === name)).toEqual([]);
	});

	test('names that begin with the text come first', () => {
		const [first, ...rest] = findLanguages('german').map(({ tag }) => tag);
		expect(first).toBe('de');
		expect(rest).toContain('de-AT');
	});

	test('a tag is found by itself, in its canonical spelling', () => {
		expect(findLanguages('DE-at')[0]).toMatchObject({ tag: 'de-AT' });
		expect(findLanguages('gsw')[0]).toMatchObject({ tag: 'gsw' });
	});

	test('leaves out what is chosen, and finds nothing in nonsense', () => {
		expect(findLanguages('german', ['de']).map(({ tag }) => tag)).not.toContain('de');
		expect(findLanguages('de', ['de']).map(({ tag }) => tag)).not.toContain('de');
		expect(findLanguages('qqqqq')).toEqual([]);
	});
});
