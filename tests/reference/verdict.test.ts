import { describe, expect, it } from 'vitest';
import { verdict } from '$lib/mapping/verdict';
import type { Effect } from '$lib/mapping/vocabulary';

/** `k` disturbed among `n` valid trials. */
function trials(k: number, n: number): Effect[] {
	return Array.from({ length: n }, (_, index) => (index < k ? 'disturbed' : 'intact'));
}

const WALKER = 'Walker et al., Neurosurgery 2004: anomia in at least two thirds of the stimulations of a site';
const THREE = 'at least three stimulations a site: common practice, no source';
const EXACT = 'exact: 3 k >= 2 n';

describe('the rule of two thirds of at least three trials', () => {
	it.each<[id: string, k: number, n: number, result: 'positive' | 'negative', source: string]>([
		['POS-01', 2, 3, 'positive', WALKER],
		['POS-01', 1, 3, 'negative', WALKER],
		['POS-04', 4, 6, 'positive', EXACT],
		['POS-04', 3, 5, 'negative', EXACT],
		['POS-04', 5, 8, 'negative', EXACT]
	])('%s: %i of %i is %s (%s)', (_id, k, n, result) => {
		expect(verdict(trials(k, n)).verdict).toBe(result);
	});

	it(`POS-02: 2 of 2 is no result yet (${THREE})`, () => {
		expect(verdict(trials(2, 2))).toMatchObject({ verdict: 'open', remaining: 1 });
	});

	it.each<[n: number, least: number]>([
		[3, 2],
		[4, 3],
		[5, 4],
		[6, 4],
		[7, 5],
		[8, 6],
		[9, 6],
		[10, 7],
		[11, 8],
		[12, 8]
	])(`POS-03: of %i trials it takes %i (${EXACT})`, (n, least) => {
		const results = Array.from({ length: n + 1 }, (_, k) => verdict(trials(k, n)).verdict);
		expect(results).toEqual(results.map((_, k) => (k >= least ? 'positive' : 'negative')));
	});

	it('POS-05: a trial with an afterdischarge leaves both counts (exact: 2 of 3, not 2 of 4)', () => {
		const withAfterdischarge: Effect[] = ['disturbed', 'excluded', 'intact', 'disturbed'];
		expect(verdict(withAfterdischarge)).toMatchObject({ verdict: 'positive', disturbed: 2, valid: 3, excluded: 1 });
	});
});
