import { describe, expect, it } from 'vitest';
import { decidingRow } from '../../../src/lib/mapping/deciding-row';
import { effectsOfRow } from '../../../src/lib/mapping/row-effects';
import { tagResults } from '../../../src/lib/mapping/sites';
import { tagViews } from '../../../src/lib/components/surgeon/tag-views';
import { CaseLog } from './case-log';

function deciding(log: CaseLog, tag: string) {
	const { state } = log;
	const found = decidingRow(
		state,
		tagResults(state).find((result) => result.tag === tag)!
	);
	return found && [found.class, found.row.task, found.row.language, found.row.disturbed, found.row.valid];
}

describe('the row that a tag shows', () => {
	it('is the positive one, whichever came first', () => {
		const log = new CaseLog();
		log.trials('4', 'iii');
		log.trials('4', 'ddi', { language: 'de' });
		expect(deciding(log, '4')).toEqual(['language', 'object-naming', 'de', 2, 3]);
	});

	it('is the speech-motor one when that alone is positive', () => {
		const log = new CaseLog();
		log.trials('4', 'mmi');
		expect(deciding(log, '4')).toEqual(['speech-motor', 'object-naming', 'en', 2, 3]);
	});

	it('is the language one when both are positive alike', () => {
		const log = new CaseLog();
		log.trials('4', 'ddd');
		log.trials('4', 'mmm', { task: 'counting' });
		expect(deciding(log, '4')).toEqual(['language', 'object-naming', 'en', 3, 3]);
	});

	it('is an open one while the tag is open, not a negative one', () => {
		const log = new CaseLog();
		log.trials('4', 'dii');
		log.trials('4', 'i', { language: 'de' });
		expect(deciding(log, '4')).toEqual(['language', 'object-naming', 'de', 0, 1]);
	});

	it('is the one with the larger share of disturbed trials, in whatever order', () => {
		const log = new CaseLog();
		log.trials('4', 'iii');
		log.trials('4', 'idi', { language: 'de' });
		expect(deciding(log, '4')).toEqual(['language', 'object-naming', 'de', 1, 3]);
	});

	it('is none at a tag never tested', () => {
		const log = new CaseLog();
		log.note('tag-placed', { tag: '4' });
		expect(deciding(log, '4')).toBeNull();
	});
});

describe('the effects of a row', () => {
	it('stand in the order of the log, with excluded trials and without those that wait for a score', () => {
		const log = new CaseLog();
		log.trials('4', 'dv?i');
		const { state } = log;
		const row = state.rows.language.get('4 object-naming en')!;
		expect(effectsOfRow(state, row)).toEqual(['disturbed', 'excluded', 'intact']);
		expect(row.trials).toHaveLength(4);
	});

	it('are those of the class asked about', () => {
		const log = new CaseLog();
		log.trials('4', 'md');
		const { state } = log;
		const row = state.rows['speech-motor'].get('4 object-naming en')!;
		expect(effectsOfRow(state, row, 'speech-motor')).toEqual(['disturbed', 'intact']);
		expect(effectsOfRow(state, row, 'language')).toEqual(['intact', 'disturbed']);
	});
});

describe('the tags on the surgeon screen', () => {
	it('have one place for every task and language of the case, tested there or not', () => {
		const log = new CaseLog();
		log.note('protocol-set', { required: [{ task: 'reading', language: 'en' }] });
		log.trials('1', 'i');
		log.trials('2', 'di', { language: 'de' });
		const views = tagViews(log.state);
		for (const { pairs } of views) {
			expect(pairs.map(({ task, language }) => `${task} ${language}`)).toEqual([
				'reading en',
				'object-naming en',
				'object-naming de'
			]);
		}
		expect(views[1]!.pairs.map(({ effects }) => effects)).toEqual([[], [], ['disturbed', 'intact']]);
	});

	it('name the error seen most often', () => {
		const log = new CaseLog();
		log.trials('1', 'imm');
		expect(tagViews(log.state)[0]).toMatchObject({
			error: 'dysarthria',
			result: 'positive',
			positive: ['speech-motor']
		});
	});
});
