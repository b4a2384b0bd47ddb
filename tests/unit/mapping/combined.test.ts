import { describe, expect, it } from 'vitest';
import { combined, stillOpen, type CombinedRow } from '$lib/mapping/combined';
import type { TaskLanguage } from '$lib/mapping/events';
import type { Verdict } from '$lib/mapping/verdict';

const naming: TaskLanguage = { task: 'object-naming', language: 'en' };
const german: TaskLanguage = { task: 'object-naming', language: 'de' };
const reading: TaskLanguage = { task: 'reading', language: 'en' };

function row(of: TaskLanguage, verdict: Verdict): CombinedRow {
	return { ...of, verdict };
}

function motor(of: TaskLanguage, verdict: Verdict): CombinedRow {
	return { ...of, verdict, class: 'speech-motor' };
}

const POSITIVE = 'positive when any task, language or class is positive there';
const WALKER = `${POSITIVE}; each language by itself: Walker et al., Neurosurgery 2004`;
const MOTOR = 'a speech-motor site never looks negative';
const REQUIRED = 'negative only when every task and language that the protocol requires is negative there';
const NONE = 'with none required: when it has language rows and all are negative';
const OPEN = 'otherwise open, naming what is still to do';

type Case = [rule: string, rows: CombinedRow[], required: TaskLanguage[], result: Verdict, open: TaskLanguage[]];

const CASES: Case[] = [
	['untested without a row', [], [], 'untested', []],
	['untested without a row', [], [naming], 'untested', []],

	[POSITIVE, [row(naming, 'positive')], [], 'positive', []],
	[POSITIVE, [row(naming, 'negative'), row(reading, 'positive')], [], 'positive', []],
	[POSITIVE, [row(reading, 'positive')], [naming], 'positive', []],
	[POSITIVE, [row(naming, 'negative'), row(reading, 'positive')], [naming], 'positive', []],
	[POSITIVE, [row(naming, 'open'), row(reading, 'positive')], [naming, reading], 'positive', []],
	[WALKER, [row(naming, 'positive'), row(german, 'negative')], [naming, german], 'positive', []],
	[MOTOR, [row(naming, 'negative'), motor(naming, 'positive')], [naming], 'positive', []],
	[MOTOR, [row(naming, 'negative'), motor(naming, 'positive')], [], 'positive', []],

	[REQUIRED, [row(naming, 'negative')], [naming], 'negative', []],
	[REQUIRED, [row(naming, 'negative'), row(german, 'negative')], [naming, german], 'negative', []],
	[REQUIRED, [row(naming, 'negative'), row(reading, 'open')], [naming], 'negative', []],
	[REQUIRED, [row(naming, 'negative')], [naming, german], 'open', [german]],
	[REQUIRED, [row(naming, 'negative')], [naming, reading], 'open', [reading]],
	[REQUIRED, [row(german, 'negative'), row(reading, 'negative')], [naming], 'open', [naming]],
	[REQUIRED, [motor(naming, 'negative')], [naming], 'open', [naming]],

	[NONE, [row(naming, 'negative')], [], 'negative', []],
	[NONE, [row(naming, 'negative'), row(reading, 'negative')], [], 'negative', []],
	[NONE, [row(naming, 'negative'), motor(naming, 'open')], [], 'negative', []],
	[NONE, [motor(naming, 'negative')], [], 'open', []],

	[OPEN, [row(naming, 'open')], [], 'open', [naming]],
	[OPEN, [row(naming, 'negative'), row(reading, 'open')], [], 'open', [reading]],
	[OPEN, [row(naming, 'untested')], [], 'open', [naming]],
	[OPEN, [row(naming, 'untested'), row(german, 'negative')], [german, naming], 'open', [naming]],
	[OPEN, [row(naming, 'open')], [naming, german, reading], 'open', [naming, german, reading]],
	[OPEN, [row(reading, 'open')], [naming], 'open', [naming]]
];

describe('one result for a site', () => {
	it.each(CASES)('%s: %j with %j required', (_rule, rows, required, result, open) => {
		for (const order of [rows, [...rows].reverse()]) {
			expect(combined(order, required)).toBe(result);
			expect(stillOpen(order, required)).toEqual(open);
		}
	});

	it('takes a row without a class as language', () => {
		expect(combined([{ ...naming, verdict: 'negative', class: 'language' }], [naming])).toBe(
			combined([row(naming, 'negative')], [naming])
		);
		expect(combined([row(naming, 'negative')], [naming])).toBe('negative');
	});
});
