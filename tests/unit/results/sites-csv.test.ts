import { describe, expect, it } from 'vitest';
import type { LogEvent } from '../../../src/lib/mapping/events';
import { fold } from '../../../src/lib/mapping/fold';
import { sitesCsv } from '../../../src/lib/server/exports/sites-csv';
import { entry, received } from '../mapping/entry';
import { readStrictly } from './strict-csv';

let made = 0;

/** Scored trials, so many of them disturbed, at a tag with stimulation or as controls without one. */
function scored(disturbed: number, valid: number, tag: string | null, other = { task: 'object-naming', milliamps: 2 }) {
	return Array.from({ length: valid }, (_, index): LogEvent[] => {
		const trial = `trial-${++made}`;
		const stimulated = tag !== null;
		const { task, milliamps } = other;
		return [
			entry('trial-presented', { trial, item: 'house', task, language: 'en', tag, stimulated, milliamps }),
			entry('trial-scored', { trial, score: index < disturbed ? 'anomia' : 'intact', corrects: [] })
		];
	}).flat();
}

function rowsOf(entries: LogEvent[], asked = 'language'): Record<string, string>[] {
	const [header = [], ...rows] = readStrictly(sitesCsv('tamu-rilo-38', fold(received(entries))));
	return rows
		.map((row) => Object.fromEntries(header.map((column, index) => [column, row[index] ?? ''])))
		.filter((row) => row.class === asked);
}

function column(rows: Record<string, string>[], name: string, digits: number): number[] {
	return rows.map((row) => Number(Number(row[name]).toFixed(digits)));
}

describe('the export of sites', () => {
	const five = [
		...scored(4, 80, null),
		...scored(3, 3, '1'),
		...scored(2, 3, '2'),
		...scored(1, 3, '3'),
		...scored(0, 3, '4'),
		...scored(2, 3, '5')
	];

	// SciPy 1.17.1: fisher_exact([[k, 3 - k], [4, 76]], 'greater'), false_discovery_control(..., method='bh'); Holm by hand:
	// the smallest times 5, the next two times 4 and 3 with the running maximum, then times 2 and 1.
	it('tests each site against the controls, and adjusts for the number of sites', () => {
		const rows = rowsOf(five);
		expect(rows.map(({ tag, control_disturbed, control_valid }) => [tag, control_disturbed, control_valid])).toEqual(
			['1', '2', '3', '4', '5'].map((tag) => [tag, '4', '80'])
		);
		expect(column(rows, 'fisher_p', 6)).toEqual([0.000381, 0.012788, 0.172016, 1, 0.012788]);
		expect(column(rows, 'fisher_holm', 6)).toEqual([0.001905, 0.051153, 0.344032, 1, 0.051153]);
		expect(column(rows, 'fisher_bh', 6)).toEqual([0.001905, 0.021314, 0.21502, 1, 0.021314]);
	});

	it('does not find a site that errs less than the controls', () => {
		// By hand: all 20 tables of three and three are at least as disturbed; two-sided it would be 2/20.
		expect(column(rowsOf([...scored(3, 3, null), ...scored(0, 3, '1')]), 'fisher_p', 6)).toEqual([1]);
	});

	// By hand, p = 4/80 = 1/20: 1/8000, 58/8000 and 1141/8000 of three, of two or more, of one or more.
	it('has the chance of as many errors at the rate of the controls', () => {
		expect(column(rowsOf(five), 'binomial_p', 6)).toEqual([0.000125, 0.00725, 0.142625, 1, 0.00725]);
	});

	// Wilson's interval of 3/3, 2/3 and 0/3, rounded: Newcombe, Stat Med 1998;17:857-872, method 3.
	it('has the interval of the share of disturbed trials', () => {
		const rows = rowsOf(five);
		expect(column(rows, 'share_low', 4).slice(0, 2)).toEqual([0.4385, 0.2077]);
		expect(column(rows, 'share_high', 4)[1]).toBe(0.9385);
		expect(column(rows, 'share_high', 4)[3]).toBe(0.5615);
	});

	it('compares with controls of the same task alone, and says nothing where there are none', () => {
		const other = { task: 'counting', milliamps: 2 };
		const [counting, naming] = rowsOf([...scored(4, 80, null), ...scored(3, 3, '1'), ...scored(3, 3, '1', other)]);
		expect(naming).toMatchObject({ task: 'object-naming', control_valid: '80' });
		expect(Number(naming?.fisher_holm)).toBeCloseTo(Number(naming?.fisher_p), 12);
		expect(counting).toMatchObject({
			task: 'counting',
			control_disturbed: '0',
			control_valid: '0',
			binomial_p: '',
			binomial_holm: '',
			binomial_bh: '',
			fisher_p: '',
			fisher_holm: '',
			fisher_bh: ''
		});
	});

	it('has a row of the map with its result, its kinds, its currents and the protocol', () => {
		const entries = [
			entry('tag-placed', { tag: '7', kind: 'subcortical' }),
			entry('protocol-set', { required: [{ task: 'reading', language: 'de' }] }),
			...scored(1, 1, '7', { task: 'object-naming', milliamps: 1.5 }),
			...scored(0, 1, '7', { task: 'object-naming', milliamps: 3 }),
			entry('trial-presented', {
				trial: 'waits',
				item: 'tree',
				task: 'object-naming',
				language: 'en',
				tag: '7',
				stimulated: true,
				milliamps: 4
			})
		];
		const expected = {
			case: 'tamu-rilo-38',
			tag: '7',
			tag_kind: 'subcortical',
			tag_result: 'open',
			task: 'object-naming',
			language: 'en',
			verdict: 'open',
			valid: '2',
			excluded: '0',
			pending: '1',
			settled: '',
			remaining: '1',
			kinds: 'anomia 1',
			milliamps_lowest: '1.5',
			milliamps_highest: '3',
			rule_min_trials: '3',
			rule_share_part: '2',
			rule_share_whole: '3',
			later: 'excluded',
			effects: '{}',
			required: '[{"task":"reading","language":"de"}]'
		};
		expect(rowsOf(entries)).toEqual([expect.objectContaining({ ...expected, disturbed: '1' })]);
		expect(rowsOf(entries, 'speech-motor')).toEqual([
			expect.objectContaining({ ...expected, disturbed: '0', settled: 'negative' })
		]);
	});
});
