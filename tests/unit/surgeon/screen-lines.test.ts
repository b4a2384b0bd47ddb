import { describe, expect, it } from 'vitest';
import { toGo, toTestAgain, withoutScore } from '../../../src/lib/components/surgeon/attention';
import { lastTrialLine, wishedLines, wishOrder } from '../../../src/lib/components/surgeon/screen-lines';
import { tagViews } from '../../../src/lib/components/surgeon/tag-views';
import { CaseLog } from './case-log';

const HEADER = { code: 'invented-00', hemisphere: 'left' as const, languages: ['en'] };
const words = (log: CaseLog) => lastTrialLine(log.state).parts.map(({ text }) => text);
const tones = (log: CaseLog) => lastTrialLine(log.state).parts.map(({ tone }) => tone);

function lines(log: CaseLog): Record<string, string> {
	const { state } = log;
	const found = wishedLines(state, tagViews(state), HEADER);
	return Object.fromEntries(found.map(({ key, parts }) => [key, parts.map(({ text }) => text).join(' | ')]));
}

describe('the last trial in one line', () => {
	it('says tag, kind, how far the result is, current and task', () => {
		const log = new CaseLog();
		log.trials('7', 'd');
		expect(words(log)).toEqual(['Tag 7', 'anomia', '1 of 1 disturbed', '2 to go', '3.0 mA', 'object naming']);
		expect(tones(log)[1]).toBe('ember');
	});

	it('says that a trial has no score yet, without colour', () => {
		const log = new CaseLog();
		log.trials('7', 'd?');
		expect(words(log).slice(0, 4)).toEqual(['Tag 7', 'not scored yet', '1 of 1 disturbed', '2 to go']);
		expect(tones(log)).not.toContain('ember');
	});

	it('says that a trial is contested', () => {
		const log = new CaseLog();
		const [trial] = log.trials('7', 'd');
		log.note('trial-scored', { trial: trial!, score: 'intact', corrects: [] }, 'second device');
		expect(words(log)).toEqual(['Tag 7', 'contested', '3 to go', '3.0 mA', 'object naming']);
	});

	it('says why a trial does not count', () => {
		const log = new CaseLog();
		const [trial] = log.trials('7', 'i');
		log.note('stimulation-started', { stimulation: 's', trial: trial!, tag: '8', milliamps: 3, source: 'stimulator' });
		expect(words(log).slice(0, 3)).toEqual(['Tag 7', 'not counted', 'stimulator says tag 8']);
		log.trials('7', 'v');
		expect(words(log).slice(0, 3)).toEqual(['Tag 7', 'not counted', 'not scorable']);
	});

	it('names a control as one, and no result with it', () => {
		const log = new CaseLog();
		log.trials(null, 'i', { milliamps: null });
		expect(words(log)).toEqual(['Control', 'intact', 'object naming']);
	});

	it('says speech-motor where a trial disturbed that alone', () => {
		const log = new CaseLog();
		log.trials('7', 'im');
		expect(words(log).slice(0, 4)).toEqual(['Tag 7', 'dysarthria', '1 of 2 disturbed, speech-motor', '1 to go']);
		expect(tones(log)[1]).toBe('ember');
	});

	it('says what will be positive, never what will be negative', () => {
		const log = new CaseLog();
		log.trials('7', 'dd');
		expect(words(log)).toContain('will be positive');
		log.trials('8', 'ii');
		expect(words(log).join(' ')).not.toMatch(/will|settled|negative/);
	});

	it('forgets a trial that was taken back', () => {
		const log = new CaseLog();
		log.trials('6', 'i');
		const presented = `entry-${log.events.length + 1}`;
		log.trials('7', 'd');
		log.note('entry-withdrawn', { entry: presented });
		expect(words(log)[0]).toBe('Tag 6');
	});

	it('names the purpose of a trial outside the mapping', () => {
		const log = new CaseLog();
		log.note('run-opened', { run: 'r', purpose: 'resection' });
		log.trials('7', 'd', { run: 'r' });
		expect(words(log)).toEqual(['Tag 7', 'anomia', 'resection', '3.0 mA', 'object naming']);
	});
});

describe('what needs attention', () => {
	it('lists a negative site with a disturbed trial, with k/n, and no other', () => {
		const log = new CaseLog();
		log.trials('1', 'iii');
		log.trials('2', 'idi');
		log.trials('3', 'ddd');
		log.trials('4', 'di');
		log.trials('10', 'diid');
		expect(toTestAgain(log.state).map(({ tag, disturbed, valid }) => [tag, disturbed, valid])).toEqual([
			['2', 1, 3],
			['10', 2, 4]
		]);
		expect(lines(log).again).toBe('Test again | 2 (1/3) | 10 (2/4)');
	});

	it('names task and language once where there are several, and speech-motor', () => {
		const log = new CaseLog();
		log.trials('2', 'idi');
		log.trials('5', 'idi');
		log.trials('2', 'mii', { language: 'de' });
		expect(lines(log).again).toBe(
			'Test again | object naming English: 2 (1/3) | 5 (1/3) | object naming German: 2 (1/3 speech-motor)'
		);
	});

	it('does not ask for a positive tag again', () => {
		const log = new CaseLog();
		log.trials('2', 'idi');
		log.trials('2', 'ddd', { language: 'de' });
		expect(toTestAgain(log.state)).toEqual([]);
	});

	it('counts what is to go, untested tags too, and says which task and language', () => {
		const log = new CaseLog();
		for (const tag of ['1', '2', '3', '4', '5', '6']) log.note('tag-placed', { tag });
		log.trials('1', 'iii');
		log.trials('2', 'ii');
		log.trials('3', 'dd');
		expect(lines(log)['to-go-object-naming-en']).toBe('will be positive: 3 | 1 to go: 2, 3 | 3 to go: 4 to 6');
		log.trials('2', 'i', { language: 'de' });
		expect(toGo(log.state)).toEqual([
			{
				task: 'object-naming',
				language: 'en',
				willBePositive: ['3'],
				trials: [
					{ remaining: 1, tags: ['2', '3'] },
					{ remaining: 3, tags: ['4', '5', '6'] }
				]
			},
			{
				task: 'object-naming',
				language: 'de',
				willBePositive: [],
				trials: [
					{ remaining: 2, tags: ['2'] },
					{ remaining: 3, tags: ['4', '5', '6'] }
				]
			}
		]);
		expect(lines(log)['to-go-object-naming-de']).toBe('Bar 2: object naming German | 2 to go: 2 | 3 to go: 4 to 6');
	});

	it('says which trials wait for a score and which are contested, the last trial apart', () => {
		const log = new CaseLog();
		const [contested] = log.trials('5', 'd');
		log.note('trial-scored', { trial: contested!, score: 'intact', corrects: [] }, 'second device');
		log.trials('6', '?');
		log.trials('7', '?');
		expect(withoutScore(log.state).notScored.map(({ tag }) => tag)).toEqual(['6', '7']);
		expect(lines(log).waiting).toBe('Contested: Tag 5 | Not scored: Tag 6');
	});

	it('counts the results', () => {
		const log = new CaseLog();
		log.note('tag-placed', { tag: '9' });
		log.trials('1', 'iii');
		log.trials('2', 'ddi');
		log.trials('3', 'd');
		expect(lines(log).counts).toBe('1 positive | 1 negative | 1 open | 1 untested');
	});

	it('has colour for positive alone', () => {
		const log = new CaseLog();
		log.trials('1', 'idi');
		const { state } = log;
		const all = [lastTrialLine(state), ...wishedLines(state, tagViews(state), HEADER)].flatMap(({ parts }) => parts);
		expect(all.filter(({ tone }) => tone === 'ember')).toEqual([]);
	});

	it('wishes for every line once before any second line', () => {
		const log = new CaseLog();
		log.trials('1', 'idi');
		log.trials('2', 'i');
		const { state } = log;
		const last = lastTrialLine(state);
		const all = wishedLines(state, tagViews(state), HEADER);
		expect(wishOrder(last, all, ({ key }) => key === 'case' || key === 'last')).toEqual([
			'again',
			'counts',
			'to-go-object-naming-en',
			'case',
			'last',
			'case'
		]);
	});
});
