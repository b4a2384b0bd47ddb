import { describe, expect, it } from 'vitest';
import { changesAway, NEWS_LASTS, positives, recentNews } from '../../../src/lib/components/surgeon/result-changes';
import { changeAway } from '../../../src/lib/messages/surgeon';
import { CaseLog, START } from './case-log';

describe('a result that changes away from positive', () => {
	it('is told with what it is now, and a change to positive is not', () => {
		const log = new CaseLog();
		log.trials('4', 'ddi');
		log.trials('5', 'ii');
		const before = positives(log.state);
		log.trials('4', 'ii');
		log.trials('5', 'd');
		expect(changesAway(before, log.state)).toEqual([{ tag: '4', to: 'negative', of: null }]);
	});

	it('is told when a trial is taken back, down to a tag without any', () => {
		const log = new CaseLog();
		log.trials('4', 'ddd');
		const before = positives(log.state);
		log.note('entry-withdrawn', { entry: 'entry-1' });
		expect(changesAway(before, log.state)).toEqual([{ tag: '4', to: 'open', of: null }]);
		log.note('entry-withdrawn', { entry: 'entry-3' });
		log.note('entry-withdrawn', { entry: 'entry-5' });
		expect(changesAway(before, log.state)).toEqual([{ tag: '4', to: 'untested', of: null }]);
	});

	it('is told for every tag that a new protocol changes', () => {
		const log = new CaseLog();
		log.trials('10', 'ddi');
		log.trials('4', 'ddi');
		log.trials('5', 'ddd');
		const before = positives(log.state);
		log.note('protocol-set', { rule: { minTrials: 3, share: [1, 1] } });
		expect(changesAway(before, log.state).map(({ tag }) => tag)).toEqual(['4', '10']);
	});

	it('is told of one language or class when the tag stays positive by another', () => {
		const log = new CaseLog();
		log.trials('4', 'ddd');
		log.trials('4', 'ddi', { language: 'de' });
		const before = positives(log.state);
		log.trials('4', 'ii', { language: 'de' });
		expect(changesAway(before, log.state)).toEqual([
			{ tag: '4', to: 'negative', of: { task: 'object-naming', language: 'de', class: 'language' } }
		]);
	});

	it('stands in words with its time', () => {
		expect(
			changeAway(
				[
					{ tag: '4', to: 'open', of: null },
					{ tag: '5', to: 'negative', of: { task: 'reading', language: 'de', class: 'speech-motor' } }
				],
				Date.parse('2026-05-04T07:31:07Z'),
				'Europe/Berlin'
			)
		).toEqual([
			'Tag 4: was positive, now open',
			'Tag 5, reading German speech-motor: was positive, now negative',
			'09:31:07'
		]);
	});
});

describe('the news of the last five minutes', () => {
	const log = new CaseLog();
	log.trials('4', 'ddi');
	log.trials('4', 'ii');
	log.trials('6', 'iii');
	// Entry 7 presents the fourth trial, entry 8 scores it: two of four is negative.
	const at = START + 8000;

	it('is found again by a screen opened later', () => {
		expect(recentNews(log.events, START + 60_000)).toEqual({ at, changes: [{ tag: '4', to: 'negative', of: null }] });
	});

	it('is gone after five minutes', () => {
		expect(recentNews(log.events, at + NEWS_LASTS - 1)).not.toBeNull();
		expect(recentNews(log.events, at + NEWS_LASTS)).toBeNull();
	});
});
