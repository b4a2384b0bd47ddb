import { execFile } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { promisify } from 'node:util';
import fc from 'fast-check';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { LogEvent } from '../../../src/lib/mapping/events';
import { fold } from '../../../src/lib/mapping/fold';
import { sites } from '../../../src/lib/mapping/sites';
import { UnreadableExport } from '../../../src/lib/server/exports/read-trials';
import { rescore } from '../../../src/lib/server/exports/rescore';
import { sitesCsv } from '../../../src/lib/server/exports/sites-csv';
import { trialsCsv } from '../../../src/lib/server/exports/trials-csv';
import { arbitraryLog } from '../mapping/arbitrary-log';
import { entry, received } from '../mapping/entry';
import { readStrictly } from './strict-csv';

const ZONE = 'Europe/Berlin';

/** Trials at one tag, scored one by one; an item may look like a formula. */
function trials(scores: readonly (string | null)[], tag = '7', item = '=house'): LogEvent[] {
	return scores.flatMap((score, index) => {
		const trial = `${tag}-${index}`;
		const presented = entry('trial-presented', {
			trial,
			item,
			task: 'object-naming',
			language: 'en',
			tag,
			stimulated: true,
			milliamps: 2.5
		});
		const scored = entry('trial-scored', { trial, score: score as 'intact', corrects: [], said: '=1+1' });
		return score === null ? [presented] : [presented, scored];
	});
}

function exported(entries: LogEvent[]): string {
	return trialsCsv('tamu-rilo-38', fold(received(entries)), ZONE);
}

/** The file with one cell changed: of all rows, or of one as a spreadsheet counts them. */
function changed(text: string, column: string, value: string, line?: number): string {
	const [header = [], ...rows] = readStrictly(text);
	const place = header.indexOf(column);
	expect(place).toBeGreaterThanOrEqual(0);
	rows.forEach((row, index) => {
		if (line === undefined || index + 2 === line) row[place] = value;
	});
	return [header, ...rows]
		.map((row) => row.map((cell) => `"${cell.replaceAll('"', '""')}"`).join(',') + '\r\n')
		.join('');
}

describe('a rescored file', () => {
	it('has the results of the map, whatever the log', () => {
		fc.assert(
			fc.property(arbitraryLog, (log) => {
				const state = fold(log);
				const expected = sites(state).map(({ tag, task, language, disturbed, valid, excluded, verdict }) => {
					return { tag, task, language, disturbed, valid, excluded, verdict };
				});
				const { results, differing } = rescore(trialsCsv('tamu-rilo-38', state, ZONE));
				expect(results).toEqual(expected);
				expect(differing).toEqual([]);
			}),
			{ numRuns: 500 }
		);
	});

	it('counts a trial by its score, and says where the exported effect is another', () => {
		const text = exported(trials(['anomia', 'anomia', 'intact']));
		expect(rescore(text).results).toEqual([
			{ tag: '7', task: 'object-naming', language: 'en', disturbed: 2, valid: 3, excluded: 0, verdict: 'positive' }
		]);
		const other = rescore(changed(text, 'score', 'intact', 2));
		expect(other.results[0]).toMatchObject({ disturbed: 1, valid: 3, verdict: 'negative' });
		expect(other.differing).toEqual([{ line: 2, exported: 'disturbed', found: 'intact' }]);
	});

	it('counts under the protocol of the file, not under the default', () => {
		const rule = entry('protocol-set', {
			rule: { minTrials: 2, share: [1, 2] },
			effects: { delay: { language: 'disturbed' } }
		});
		expect(rescore(exported([rule, ...trials(['delay', 'intact'])])).results[0]).toMatchObject({
			disturbed: 1,
			valid: 2,
			verdict: 'positive'
		});
		expect(rescore(exported(trials(['delay', 'intact']))).results[0]).toMatchObject({
			disturbed: 0,
			valid: 2,
			verdict: 'open'
		});
	});

	it('leaves a trial that is not scored, or contested, out of both numbers, and counts an excluded one apart', () => {
		const score = (trial: string, kind: 'anomia' | 'intact', id: string) =>
			entry('trial-scored', { trial, score: kind, corrects: [] }, { id });
		const text = exported([
			...trials(['anomia', null, null, 'seizure', 'anomia', 'anomia']),
			score('7-2', 'anomia', 'one'),
			score('7-2', 'intact', 'other'),
			entry('trial-onset', { trial: '7-4', shown: false, reason: 'came late' }),
			entry('trial-excluded', { trial: '7-5', reason: '=afterdischarge' })
		]);
		expect(rescore(text).results).toEqual([
			{ tag: '7', task: 'object-naming', language: 'en', disturbed: 1, valid: 1, excluded: 3, verdict: 'open' }
		]);
	});

	it('takes a contested trial for none even where somebody has filled in a score', () => {
		const text = changed(exported(trials(['anomia', 'intact', 'intact'])), 'contested', 'true', 2);
		const { results, differing } = rescore(text);
		expect(results[0]).toMatchObject({ disturbed: 0, valid: 2, verdict: 'open' });
		expect(differing).toEqual([{ line: 2, exported: 'disturbed', found: 'pending' }]);
	});

	it('has no row for a baseline, a control, a trial without an item, or a run that was never opened', () => {
		const base = { task: 'object-naming', language: 'en', milliamps: null };
		const text = exported([
			entry('run-opened', { run: 'run-1', purpose: 'baseline' }),
			entry('trial-presented', { ...base, trial: 'a', item: 'x', tag: '1', stimulated: true, run: 'run-1' }),
			entry('trial-presented', { ...base, trial: 'b', item: 'x', tag: '1', stimulated: false }),
			entry('trial-presented', { ...base, trial: 'c', item: null, tag: '1', stimulated: true }),
			entry('trial-presented', { ...base, trial: 'd', item: 'x', tag: '1', stimulated: true, run: 'run-2' })
		]);
		expect(readStrictly(text)).toHaveLength(5);
		expect(rescore(text).results).toEqual([]);
	});

	it('is read when a spreadsheet has saved it again: byte order mark, line ends, capitals, columns moved', () => {
		const text = exported(trials(['anomia', 'anomia', 'intact']));
		const [header = [], ...rows] = readStrictly(text);
		const saved = [header, ...rows].map((row) => [...row].reverse().map(quote).join(','));
		const again = `\ufeff${saved.join('\n').replaceAll('"true"', '"TRUE"').replaceAll('"false"', '"FALSE"')}\n`;
		expect(again).toContain('TRUE');
		expect(rescore(again)).toEqual(rescore(text));
	});
});

function quote(cell: string): string {
	return `"${cell.replaceAll('"', '""')}"`;
}

describe('a file that is no export of trials, or not any more', () => {
	const text = exported(trials(['anomia', 'anomia', 'intact']));
	const header = text.slice(0, text.indexOf('\r\n') + 2);

	it.each<[string, string, RegExp]>([
		['nothing', '', /not an export of trials/],
		['another table', 'name,age\r\nx,1\r\n', /not an export of trials.*there is no case, trial/],
		['a line cut short', text.slice(0, text.length - 40), /not a table as it was exported/],
		['an open quote', `${header}"tamu`, /not a table as it was exported/],
		['semicolons', text.replaceAll(',', ';'), /save it as CSV with commas|not a table/],
		['a score of no vocabulary', changed(text, 'score', 'anomie', 3), /row 3, score: "anomie" is not a score/],
		['a second score', changed(text, 'also', 'anomia oops', 3), /row 3, also: "anomia oops" is not a score/],
		['a tag turned into a date', changed(text, 'tag', '07.05.2026', 2), /row 2, tag: "07.05.2026" is not a tag/],
		['a choice turned into a word', changed(text, 'stimulated', 'yes', 2), /row 2, stimulated: "yes" is neither/],
		['a purpose of its own', changed(text, 'purpose', 'play', 4), /row 4, purpose: "play" is not a purpose/],
		['effects cut off', changed(text, 'effects', '{"delay"'), /row 2, effects: "{"delay"" is not as it was written/],
		['a rule that is none', changed(text, 'rule_min_trials', '0'), /row 2, rule_min_trials: "0" is not a whole/],
		['a share above one', changed(text, 'rule_share_part', '4'), /row 2, rule_share_part: "4" is more than/],
		['two protocols', changed(text, 'rule_min_trials', '2', 3), /row 3, rule_min_trials: differs from row 2/],
		['two cases', changed(text, 'case', 'tamu-rilo-39', 4), /row 4, case: differs from row 2/],
		['a row twice', `${text}${text.slice(text.lastIndexOf('\r\n', text.length - 3) + 2)}`, /row 5: the trial of row 4/]
	])('%s is refused, saying where and why', (_, file, reason) => {
		expect(() => rescore(file)).toThrow(UnreadableExport);
		expect(() => rescore(file)).toThrow(reason);
	});

	it('as the export of sites', () => {
		expect(() => rescore(sitesCsv('tamu-rilo-38', fold([])))).toThrow(/there is no trial, purpose/);
	});
});

describe('npm run rescore', () => {
	let folder = '';
	beforeAll(() => void (folder = mkdtempSync(join(tmpdir(), 'rescore-'))));
	afterAll(() => rmSync(folder, { recursive: true }));

	async function run(...args: string[]): Promise<{ code: number; stdout: string; stderr: string }> {
		try {
			return { code: 0, ...(await promisify(execFile)('npm', ['run', '--silent', 'rescore', '--', ...args])) };
		} catch (failure) {
			return failure as { code: number; stdout: string; stderr: string };
		}
	}

	it('prints the verdicts of a file as CSV and nothing else', async () => {
		const file = join(folder, 'trials.csv');
		writeFileSync(file, exported([...trials(['anomia', 'anomia', 'intact']), ...trials(['intact'], '12')]));
		expect(await run(file)).toEqual({
			code: 0,
			stdout:
				'tag,task,language,disturbed,valid,excluded,verdict\r\n' +
				'7,object-naming,en,2,3,0,positive\r\n' +
				'12,object-naming,en,0,1,0,open\r\n',
			stderr: ''
		});
	});

	it('says what is wrong in one line and fails', async () => {
		const foreign = join(folder, 'foreign.csv');
		writeFileSync(foreign, Buffer.from([0xff, 0xfe, 0x41, 0x00]));
		expect(await run(foreign)).toMatchObject({
			code: 1,
			stdout: '',
			stderr: `${foreign} cannot be read: it is not text in UTF-8\n`
		});
		const missing = await run(join(folder, 'none.csv'));
		expect(missing).toMatchObject({ code: 1, stdout: '' });
		expect(missing.stderr).toMatch(/^.*none\.csv cannot be read: .*no such file.*\n$/);
		expect(await run()).toMatchObject({
			code: 1,
			stdout: '',
			stderr: 'Name the file: npm run --silent rescore -- trials.csv\n'
		});
	});
});
