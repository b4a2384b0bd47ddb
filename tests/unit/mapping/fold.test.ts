/**
 * The sentences of the event contract that the fold keeps, one by one, each on a log small enough to work out by hand.
 * The quoted words are the contract's.
 */
import { describe, expect, it } from 'vitest';
import { controlRates, isControl } from '../../../src/lib/mapping/controls';
import type { EventData, LogEvent } from '../../../src/lib/mapping/events';
import { fold } from '../../../src/lib/mapping/fold';
import { compareTags, repeatedPresentations, sites, tagResults } from '../../../src/lib/mapping/sites';
import type { Score } from '../../../src/lib/mapping/vocabulary';
import { entry, received, time } from './entry';

function presented(trial: string, data: Partial<EventData['trial-presented']> = {}, other: Partial<LogEvent> = {}) {
	const usual = { item: 'house', task: 'object-naming', language: 'en', tag: '7', stimulated: true, milliamps: 2 };
	return entry('trial-presented', { trial, ...usual, ...data }, { id: `${trial} presented`, ...other });
}

function scored(trial: string, score: Score, data: Partial<EventData['trial-scored']> = {}, id = `${trial} ${score}`) {
	return entry('trial-scored', { trial, score, corrects: [], ...data }, { id });
}

function withdrawn(target: string, id = `${target} withdrawn`) {
	return entry('entry-withdrawn', { entry: target }, { id });
}

/** One trial with its score. */
function trial(name: string, score: Score, data: Partial<EventData['trial-presented']> = {}): LogEvent[] {
	return [presented(name, data), scored(name, score)];
}

/** Trials at one tag, one for each score. */
function trials(scores: Score[], data: Partial<EventData['trial-presented']> = {}): LogEvent[] {
	return scores.flatMap((score, index) => trial(`${data.tag ?? '7'}-${index + 1}`, score, data));
}

function caseOf(...entries: (LogEvent | LogEvent[])[]) {
	return fold(received(entries.flat()));
}

/** "tag disturbed/valid (excluded) verdict" of each row of class language. */
function language(...entries: (LogEvent | LogEvent[])[]): string[] {
	return sites(caseOf(...entries)).map(inShort);
}

function speechMotor(...entries: (LogEvent | LogEvent[])[]): string[] {
	return sites(caseOf(...entries), 'speech-motor').map(inShort);
}

function inShort(row: { tag: string; disturbed: number; valid: number; excluded: number; verdict: string }): string {
	return `${row.tag} ${row.disturbed}/${row.valid} (${row.excluded}) ${row.verdict}`;
}

describe('the rule', () => {
	it.each([
		[['anomia', 'anomia', 'intact'], '7 2/3 (0) positive'],
		[['anomia', 'intact', 'intact'], '7 1/3 (0) negative'],
		[['anomia', 'anomia', 'intact', 'intact'], '7 2/4 (0) negative'],
		[['anomia', 'anomia', 'anomia', 'intact', 'intact'], '7 3/5 (0) negative'],
		[['anomia', 'anomia'], '7 2/2 (0) open'],
		[['seizure', 'anomia', 'anomia', 'intact'], '7 2/3 (1) positive'],
		[['seizure'], '7 0/0 (1) untested']
	] as [Score[], string][])('"n >= 3 and 3k >= 2n": %j is %s', (scores, expected) => {
		expect(language(trials(scores))).toEqual([expected]);
	});

	it('"open while 0 < n < 3 (with settled ... when the remaining trials cannot change it)"', () => {
		const settled = (scores: Score[]) =>
			sites(caseOf(trials(scores))).map(({ settled, remaining }) => [settled, remaining]);
		expect(settled(['anomia', 'anomia'])).toEqual([['positive', 1]]);
		expect(settled(['intact', 'intact'])).toEqual([['negative', 1]]);
		expect(settled(['anomia', 'intact'])).toEqual([[null, 1]]);
		expect(settled(['anomia'])).toEqual([[null, 2]]);
		expect(settled(['anomia', 'anomia', 'intact'])).toEqual([[null, 0]]);
	});

	it('"changing the protocol leaves every trial untouched": entries and presentations stay, verdicts follow', () => {
		const log = trials(['anomia', 'delay', 'intact']);
		const rule = entry('protocol-set', { rule: { minTrials: 3, share: [1, 3] } });
		const before = caseOf(log);
		const after = caseOf(log, rule);
		expect(sites(before).map(inShort)).toEqual(['7 1/3 (0) negative']);
		expect(sites(after).map(inShort)).toEqual(['7 1/3 (0) positive']);
		expect([...after.trials]).toEqual([...before.trials]);
	});
});

describe('the protocol', () => {
	it('"a field given replaces that field whole, others stay; verdicts of all trials follow"', () => {
		const log = trials(['delay', 'self-correction', 'delay']);
		const counts = { language: 'disturbed' } as const;
		const delay = entry(
			'protocol-set',
			{ effects: { delay: counts, 'self-correction': counts } },
			{ id: 'both count' }
		);
		const other = entry('protocol-set', { rule: { minTrials: 2, share: [2, 3] } }, { id: 'two trials' });
		const again = entry('protocol-set', { effects: { 'self-correction': counts } }, { id: 'one counts' });
		expect(language(log)).toEqual(['7 0/3 (0) negative']);
		expect(language(log, delay)).toEqual(['7 3/3 (0) positive']);
		expect(language(log, delay, other)).toEqual(['7 3/3 (0) positive']);
		expect(language(log, delay, other, again)).toEqual(['7 1/3 (0) negative']);
		expect(caseOf(delay, other, again).protocol).toMatchObject({
			rule: { minTrials: 2, share: [2, 3] },
			effects: { 'self-correction': counts }
		});
		expect(caseOf(delay, again).protocol.effects).toEqual({ 'self-correction': counts });
	});

	it('holds for trials before and after it, and its withdrawal brings the one before back', () => {
		const strict = entry('protocol-set', { rule: { minTrials: 4, share: [2, 3] } }, { id: 'strict' });
		expect(language(strict, trials(['anomia', 'anomia', 'intact']))).toEqual(['7 2/3 (0) open']);
		expect(language(trials(['anomia', 'anomia', 'intact']), strict)).toEqual(['7 2/3 (0) open']);
		expect(language(trials(['anomia', 'anomia', 'intact']), strict, withdrawn('strict'))).toEqual([
			'7 2/3 (0) positive'
		]);
	});

	it('"an error that came more than 4 s after ... excludes ... unless the protocol counts it"', () => {
		const log = [presented('1'), scored('1', 'anomia', { when: 'later' })];
		expect(language(log)).toEqual(['7 0/0 (1) untested']);
		expect(language(log, entry('protocol-set', { later: 'counted' }))).toEqual(['7 1/1 (0) open']);
	});
});

describe('trials and rows', () => {
	it('"one row a tag, task and language that was stimulated"', () => {
		const state = caseOf(
			trial('1', 'intact', { tag: '12' }),
			trial('2', 'intact', { tag: '7B' }),
			trial('3', 'intact', { tag: '7' }),
			trial('4', 'intact', { tag: '7', task: 'counting' }),
			trial('5', 'intact', { tag: '7', language: 'de' }),
			trial('6', 'intact', { tag: 'A' }),
			trial('7', 'intact', { tag: '3', stimulated: false })
		);
		expect(sites(state).map(({ tag, task, language }) => `${tag} ${task} ${language}`)).toEqual([
			'7 counting en',
			'7 object-naming de',
			'7 object-naming en',
			'7B object-naming en',
			'12 object-naming en',
			'A object-naming en'
		]);
		expect(['B', '10', '7B', '2', '7', 'A1', 'A'].sort(compareTags)).toEqual(['2', '7', '7B', '10', 'A', 'A1', 'B']);
	});

	it('"a trial not yet scored, or contested, is pending: neither valid nor excluded"', () => {
		expect(language(presented('1'))).toEqual(['7 0/0 (0) untested']);
		expect(language(presented('1'), scored('1', 'anomia'), scored('1', 'intact'))).toEqual(['7 0/0 (0) untested']);
	});

	it('"an excluded one is excluded, scored or not"', () => {
		const excluded = entry('trial-excluded', { trial: '1', reason: 'afterdischarge' });
		expect(language(presented('1'), excluded)).toEqual(['7 0/0 (1) untested']);
		expect(language(presented('1'), scored('1', 'anomia'), excluded)).toEqual(['7 0/0 (1) untested']);
		expect(language(presented('1'), scored('1', 'anomia'), scored('1', 'intact'), excluded)).toEqual([
			'7 0/0 (1) untested'
		]);
	});

	it('"independent of any score and of order": an exclusion may come first, and its withdrawal counts the trial again', () => {
		const excluded = entry('trial-excluded', { trial: '1', reason: 'afterdischarge' }, { id: 'excluded' });
		expect(language(excluded, trial('1', 'anomia'))).toEqual(['7 0/0 (1) untested']);
		expect(language(excluded, trial('1', 'anomia'), withdrawn('excluded'))).toEqual(['7 1/1 (0) open']);
	});

	it('"item is null ...: no row in class language, one as any other in speech-motor"', () => {
		const log = trials(['negative-motor', 'negative-motor', 'intact'], { item: null, task: 'tongue' });
		expect(language(log)).toEqual([]);
		expect(speechMotor(log)).toEqual(['7 2/3 (0) positive']);
	});

	it('"anarthria and negative motor response are excluded" in language and disturbed in speech-motor', () => {
		const log = trials(['anarthria', 'negative-motor', 'anomia', 'speech-arrest']);
		expect(language(log)).toEqual(['7 2/2 (2) open']);
		expect(speechMotor(log)).toEqual(['7 2/3 (1) positive']);
	});

	it('"a trial without stimulation has none or is a control at that tag, and never counts for the site"', () => {
		const control = { stimulated: false };
		const log = [trial('1', 'anomia', { ...control, tag: '7' }), trial('2', 'intact', { ...control, tag: null })];
		expect(language(...log)).toEqual([]);
		expect(language(...log, trial('3', 'anomia'))).toEqual(['7 1/1 (0) open']);
		expect(controlRates(caseOf(...log))).toEqual([{ task: 'object-naming', language: 'en', disturbed: 1, valid: 2 }]);
	});

	it('"a second trial-presented for one trial is stored, ignored and reported"', () => {
		const second = presented('1', { tag: '9' }, { id: 'again' });
		const state = caseOf(trial('1', 'anomia'), second);
		expect(sites(state).map(inShort)).toEqual(['7 1/1 (0) open']);
		expect(repeatedPresentations(state)).toEqual(['again']);
		expect(state.entries.has('again')).toBe(true);
	});

	it('"kinds = {kind: count} and milliamps over the valid trials, intact left out"', () => {
		const state = caseOf(
			presented('1', { milliamps: 3.5 }),
			scored('1', 'anomia', { also: ['delay'] }),
			trial('2', 'intact', { milliamps: 2 }),
			trial('3', 'anomia', { milliamps: null }),
			trial('4', 'seizure', { milliamps: 8 }),
			presented('5', { milliamps: 0.5 })
		);
		expect(sites(state)).toMatchObject([{ kinds: { anomia: 2, delay: 1 }, milliamps: [2, 3.5] }]);
		const without = caseOf(trial('1', 'intact', { milliamps: null }));
		expect(sites(without)).toMatchObject([{ kinds: {}, milliamps: null }]);
	});

	it('"a trial at a tag never placed is as good as any"', () => {
		expect(language(trials(['anomia', 'anomia', 'anomia'], { tag: 'Q9' }))).toEqual(['Q9 3/3 (0) positive']);
	});
});

describe('scores', () => {
	it('"a score stands until one that names it arrives"', () => {
		const log = [presented('1'), scored('1', 'anomia')];
		expect(language(log, scored('1', 'intact', { corrects: ['1 anomia'] }))).toEqual(['7 0/1 (0) open']);
	});

	it('"two standing scores make the trial contested", the same score twice too', () => {
		const state = caseOf(presented('1'), scored('1', 'anomia', {}, 'a'), scored('1', 'anomia', {}, 'b'));
		expect(state.trials.get('1')).toMatchObject({ contested: true, standing: ['a', 'b'], score: null });
	});

	it('"makes no verdict until the examiner settles it": one score that names both', () => {
		const contest = [presented('1'), scored('1', 'anomia'), scored('1', 'intact')];
		const half = scored('1', 'delay', { corrects: ['1 anomia'] });
		const settled = scored('1', 'anomia', { corrects: ['1 anomia', '1 intact'] }, 'settled');
		expect(language(contest, half)).toEqual(['7 0/0 (0) untested']);
		expect(language(contest, settled)).toEqual(['7 1/1 (0) open']);
		expect(caseOf(contest, settled).trials.get('1')).toMatchObject({ contested: false, standing: ['settled'] });
	});

	it('contested again when the settlement is withdrawn; settled when one of the two is', () => {
		const contest = [presented('1'), scored('1', 'anomia'), scored('1', 'intact')];
		const settled = scored('1', 'anomia', { corrects: ['1 anomia', '1 intact'] }, 'settled');
		expect(caseOf(contest, settled, withdrawn('settled')).trials.get('1')?.contested).toBe(true);
		expect(language(contest, withdrawn('1 intact'))).toEqual(['7 1/1 (0) open']);
	});

	it('"a score (those it named stand again)"', () => {
		const corrected = [presented('1'), scored('1', 'anomia'), scored('1', 'intact', { corrects: ['1 anomia'] })];
		expect(language(corrected, withdrawn('1 intact'))).toEqual(['7 1/1 (0) open']);
	});

	it('a score that was replaced by one that was replaced stays replaced', () => {
		const state = caseOf(
			presented('1'),
			scored('1', 'anomia'),
			scored('1', 'delay', { corrects: ['1 anomia'] }),
			scored('1', 'intact', { corrects: ['1 delay'] })
		);
		expect(state.trials.get('1')).toMatchObject({ contested: false, standing: ['1 intact'] });
	});

	it('a score may arrive before the score it replaces and before its trial, and takes effect then', () => {
		const correction = scored('1', 'intact', { corrects: ['1 anomia'] });
		expect(language(correction, scored('1', 'anomia'), presented('1'))).toEqual(['7 0/1 (0) open']);
		expect(caseOf(correction, scored('1', 'anomia')).trials.size).toBe(0);
	});

	it('a score that names itself replaces nothing', () => {
		expect(language(presented('1'), scored('1', 'anomia', { corrects: ['1 anomia'] }))).toEqual(['7 1/1 (0) open']);
	});
});

describe('what the patient’s device did', () => {
	const notShown = entry('trial-onset', { trial: '1', shown: false, reason: 'arrived late' }, { id: 'not shown' });
	const shown = entry('trial-onset', { trial: '1', shown: true }, { id: 'shown' });

	it('"shown: false excludes the trial whatever its score"', () => {
		expect(language(trial('1', 'anomia'), notShown)).toEqual(['7 0/0 (1) untested']);
		expect(language(notShown, presented('1'))).toEqual(['7 0/0 (1) untested']);
		expect(language(trial('1', 'anomia'), shown)).toEqual(['7 1/1 (0) open']);
	});

	it('"until that entry is withdrawn": another that says shown does not bring it back', () => {
		expect(language(trial('1', 'anomia'), notShown, shown)).toEqual(['7 0/0 (1) untested']);
		expect(language(trial('1', 'anomia'), notShown, withdrawn('not shown'))).toEqual(['7 1/1 (0) open']);
	});
});

describe('corrections', () => {
	it('"that was eight, not seven": the trial moves from one tag to the other', () => {
		const log = [trials(['anomia', 'anomia']), entry('trial-corrected', { trial: '7-2', tag: '8' }, { id: 'eight' })];
		expect(language(...log)).toEqual(['7 1/1 (0) open', '8 1/1 (0) open']);
		expect(language(...log, withdrawn('eight'))).toEqual(['7 2/2 (0) open']);
	});

	it('a row without trials is gone', () => {
		const log = [trial('1', 'anomia'), entry('trial-corrected', { trial: '1', tag: '8' })];
		expect(language(...log)).toEqual(['8 1/1 (0) open']);
	});

	it('"overrides trial-presented field by field, the later in the log holds"', () => {
		const state = caseOf(
			entry('trial-corrected', { trial: '1', tag: '8', milliamps: 4 }),
			trial('1', 'anomia'),
			entry('trial-corrected', { trial: '1', tag: '9' }),
			entry('trial-corrected', { trial: '1', task: 'counting', language: 'de', item: null })
		);
		expect(state.trials.get('1')).toMatchObject({
			tag: '9',
			milliamps: 4,
			task: 'counting',
			language: 'de',
			item: null,
			stimulated: true
		});
	});

	it('a stimulated trial corrected to a control leaves its row and joins the controls, and the other way round', () => {
		const toControl = entry('trial-corrected', { trial: '1', stimulated: false });
		expect(language(trial('1', 'anomia'), toControl)).toEqual([]);
		expect(controlRates(caseOf(trial('1', 'anomia'), toControl))).toMatchObject([{ disturbed: 1, valid: 1 }]);
		const toStimulated = entry('trial-corrected', { trial: '1', stimulated: true });
		expect(language(trial('1', 'anomia', { stimulated: false }), toStimulated)).toEqual(['7 1/1 (0) open']);
	});
});

describe('withdrawals', () => {
	it('"a trial-presented (that trial never was)"; the second presentation of it then holds', () => {
		expect(language(trial('1', 'anomia'), withdrawn('1 presented'))).toEqual([]);
		const second = presented('1', { tag: '9' }, { id: 'again' });
		const state = caseOf(trial('1', 'anomia'), second, withdrawn('1 presented'));
		expect(sites(state).map(inShort)).toEqual(['9 1/1 (0) open']);
		expect(repeatedPresentations(state)).toEqual([]);
	});

	it('a trial whose second presentation holds counts once among its neighbours', () => {
		const log = received([
			...trials(['anomia', 'anomia']),
			presented('7-1', {}, { id: 'again' }),
			withdrawn('7-1 presented')
		]);
		const state = fold(log.slice(5), fold(log.slice(0, 5)));
		expect(sites(state)).toMatchObject([{ disturbed: 2, valid: 2, verdict: 'open', trials: ['7-2', '7-1'] }]);
	});

	it('"or another entry-withdrawn", to any depth', () => {
		const log = [trial('1', 'anomia'), withdrawn('1 anomia', 'w1')];
		expect(language(...log)).toEqual(['7 0/0 (0) untested']);
		expect(language(...log, withdrawn('w1', 'w2'))).toEqual(['7 1/1 (0) open']);
		expect(language(...log, withdrawn('w1', 'w2'), withdrawn('w2', 'w3'))).toEqual(['7 0/0 (0) untested']);
		expect(language(...log, withdrawn('w1', 'w2'), withdrawn('w2', 'w3'), withdrawn('w3', 'w4'))).toEqual([
			'7 1/1 (0) open'
		]);
	});

	it('an entry withdrawn twice stays withdrawn while one of the two stands', () => {
		const log = [trial('1', 'anomia'), withdrawn('1 anomia', 'w1'), withdrawn('1 anomia', 'w2')];
		expect(language(...log, withdrawn('w1', 'w3'))).toEqual(['7 0/0 (0) untested']);
		expect(language(...log, withdrawn('w1', 'w3'), withdrawn('w2', 'w4'))).toEqual(['7 1/1 (0) open']);
	});

	it('"takes back an entry before it in the log": one that comes later is not touched', () => {
		expect(language(withdrawn('1 anomia'), trial('1', 'anomia'))).toEqual(['7 1/1 (0) open']);
		expect(language(trial('1', 'anomia'), withdrawn('itself', 'itself'))).toEqual(['7 1/1 (0) open']);
	});
});

describe('runs', () => {
	const inRun = (name: string) => trials(['anomia', 'anomia', 'anomia'], { run: name });

	it.each(['baseline', 'ladder', 'resection', 'follow-up', 'simulation'] as const)(
		'"only mapping trials make rows, verdicts and control rates": %s makes none',
		(purpose) => {
			const opened = entry('run-opened', { run: 'r', purpose });
			const control = trial('c', 'anomia', { run: 'r', stimulated: false });
			expect(language(opened, inRun('r'))).toEqual([]);
			expect(speechMotor(opened, inRun('r'))).toEqual([]);
			expect(controlRates(caseOf(opened, control))).toEqual([]);
		}
	);

	it('"without a run the trial belongs to the case\'s mapping"', () => {
		expect(language(trials(['anomia', 'anomia', 'anomia']))).toEqual(['7 3/3 (0) positive']);
	});

	it('"with a run not opened yet: none until it is"', () => {
		const control = trial('c', 'anomia', { run: 'r', stimulated: false });
		expect(language(inRun('r'))).toEqual([]);
		expect(controlRates(caseOf(control))).toEqual([]);
		const opened = entry('run-opened', { run: 'r', purpose: 'mapping' });
		expect(language(inRun('r'), opened)).toEqual(['7 3/3 (0) positive']);
		expect(controlRates(caseOf(control, opened))).toMatchObject([{ disturbed: 1, valid: 1 }]);
	});

	it('"the last run-opened tells the purpose", whatever the run was before and whether it is closed', () => {
		const baseline = entry('run-opened', { run: 'r', purpose: 'baseline' }, { id: 'baseline' });
		const mapping = entry('run-opened', { run: 'r', purpose: 'mapping' }, { id: 'mapping' });
		const closed = entry('run-closed', { run: 'r' });
		expect(language(baseline, inRun('r'), mapping)).toEqual(['7 3/3 (0) positive']);
		expect(language(mapping, inRun('r'), baseline)).toEqual([]);
		expect(language(mapping, inRun('r'), baseline, withdrawn('baseline'))).toEqual(['7 3/3 (0) positive']);
		expect(language(mapping, inRun('r'), closed)).toEqual(['7 3/3 (0) positive']);
	});

	it('"another takes over with a new run-opened for the same run"', () => {
		const first = entry('run-opened', { run: 'r', purpose: 'mapping', lead: 'examiner' }, { id: 'first' });
		const closed = entry('run-closed', { run: 'r' });
		const second = entry('run-opened', { run: 'r', purpose: 'mapping', lead: 'tablet' }, { id: 'second' });
		const runs = (...log: LogEvent[]) => [...caseOf(...log).runs.values()];
		expect(runs(first, second)).toEqual([{ run: 'r', purpose: 'mapping', lead: 'tablet', open: true }]);
		expect(runs(first, closed)).toEqual([{ run: 'r', purpose: 'mapping', lead: 'examiner', open: false }]);
		expect(runs(first, closed, second)).toMatchObject([{ lead: 'tablet', open: true }]);
		expect(runs(first, withdrawn('first'))).toEqual([]);
	});
});

describe('pauses', () => {
	const opened = entry('pause-opened', { pause: 'p', reason: 'rest' }, { id: 'opened', at: time(10) });
	const closed = entry('pause-closed', { pause: 'p' }, { id: 'closed', at: time(20) });
	const at = (seconds: number, data: Partial<EventData['trial-presented']> = {}) => [
		presented('1', data, { at: time(seconds) }),
		scored('1', 'anomia')
	];

	it.each([
		[9.999, '7 1/1 (0) open'],
		[10, '7 0/0 (1) untested'],
		[19.999, '7 0/0 (1) untested'],
		[20, '7 1/1 (0) open']
	])('"trials with opened <= at < closed": presented %s s in, the pause is from 10 s to 20 s', (seconds, expected) => {
		expect(language(opened, at(seconds), closed)).toEqual([expected]);
		expect(language(at(seconds), opened, closed)).toEqual([expected]);
	});

	it('compares moments, not texts: the zone of a time does not matter', () => {
		const inAnotherZone = { ...opened, at: time(10, '+02:00') } as LogEvent;
		expect(language(inAnotherZone, at(15), closed)).toEqual(['7 0/0 (1) untested']);
		expect(language(inAnotherZone, at(9), closed)).toEqual(['7 1/1 (0) open']);
	});

	it('"controls too"', () => {
		expect(controlRates(caseOf(opened, at(15, { stimulated: false }), closed))).toEqual([]);
		expect(controlRates(caseOf(opened, at(25, { stimulated: false }), closed))).toMatchObject([{ valid: 1 }]);
	});

	it('lasts while it is not closed, is nothing when only closed, and is gone when withdrawn', () => {
		expect(language(opened, at(999))).toEqual(['7 0/0 (1) untested']);
		expect(language(closed, at(15))).toEqual(['7 1/1 (0) open']);
		expect(language(opened, at(15), closed, withdrawn('opened'))).toEqual(['7 1/1 (0) open']);
		expect(language(opened, at(25), closed, withdrawn('closed'))).toEqual(['7 0/0 (1) untested']);
	});
});

describe('a stimulation that names a trial', () => {
	const started = (tag: string | null) =>
		entry(
			'stimulation-started',
			{ stimulation: 's', trial: '1', tag, milliamps: 2, source: 'foot switch' },
			{ id: 's' }
		);

	it('"never makes a trial"', () => {
		expect(caseOf(started('7')).trials.size).toBe(0);
		expect(language(started('7'))).toEqual([]);
	});

	it('"if it names a trial at another tag ..., that trial is excluded until corrected"', () => {
		expect(language(trial('1', 'anomia'), started('7'))).toEqual(['7 1/1 (0) open']);
		expect(language(trial('1', 'anomia'), started('8'))).toEqual(['7 0/0 (1) untested']);
		const eight = entry('trial-corrected', { trial: '1', tag: '8' });
		expect(language(trial('1', 'anomia'), started('8'), eight)).toEqual(['8 1/1 (0) open']);
		expect(language(trial('1', 'anomia'), started('7'), eight)).toEqual(['8 0/0 (1) untested']);
		expect(language(trial('1', 'anomia'), started('8'), withdrawn('s'))).toEqual(['7 1/1 (0) open']);
	});

	it('"null on its side disagrees with nothing"', () => {
		expect(language(trial('1', 'anomia'), started(null))).toEqual(['7 1/1 (0) open']);
	});

	it('a stimulation at a tag during a control that has none excludes the control', () => {
		const control = trial('1', 'intact', { tag: null, stimulated: false });
		expect(controlRates(caseOf(control, started(null)))).toMatchObject([{ valid: 1 }]);
		expect(controlRates(caseOf(control, started('8')))).toEqual([]);
	});
});

describe('control rates', () => {
	it('leave out what is pending or excluded, and keep tasks and languages apart in the order of the log', () => {
		const control = { stimulated: false };
		const state = caseOf(
			scored('1', 'intact'),
			trial('2', 'anomia', { ...control, task: 'counting' }),
			presented('1', control),
			trial('3', 'intact', { ...control, task: 'counting' }),
			trial('4', 'intact', { ...control, task: 'counting', language: 'de' }),
			presented('5', { ...control, task: 'counting' }),
			trial('6', 'inattentive', { ...control, task: 'counting' })
		);
		expect(controlRates(state)).toEqual([
			{ task: 'counting', language: 'en', disturbed: 1, valid: 2 },
			{ task: 'object-naming', language: 'en', disturbed: 0, valid: 1 },
			{ task: 'counting', language: 'de', disturbed: 0, valid: 1 }
		]);
	});

	it('without an item say nothing of language, as the rows', () => {
		const state = caseOf(trial('1', 'negative-motor', { stimulated: false, item: null, task: 'tongue' }));
		expect(controlRates(state)).toEqual([]);
		expect(controlRates(state, 'speech-motor')).toEqual([{ task: 'tongue', language: 'en', disturbed: 1, valid: 1 }]);
		const control = state.trials.get('1')!;
		expect([isControl(control), isControl(control, 'speech-motor')]).toEqual([false, true]);
	});
});

describe('tags', () => {
	const placed = (tag: string, kind?: 'cortical' | 'subcortical') =>
		entry('tag-placed', kind ? { tag, kind } : { tag }, { id: `${tag} placed` });
	const removed = (tag: string) => entry('tag-removed', { tag }, { id: `${tag} removed` });
	const results = (...log: (LogEvent | LogEvent[])[]) => tagResults(caseOf(...log));

	it('"the combined result of every tag placed or tested"', () => {
		expect(results(placed('10'), placed('2', 'subcortical'), trial('1', 'intact'))).toEqual([
			{ tag: '2', kind: 'subcortical', result: 'untested', positive: [], open: [] },
			{ tag: '7', kind: 'cortical', result: 'open', positive: [], open: [{ task: 'object-naming', language: 'en' }] },
			{ tag: '10', kind: 'cortical', result: 'untested', positive: [], open: [] }
		]);
	});

	it('a tag that was removed untested is not shown; one that was tested keeps its results; laid again it is there again', () => {
		expect(results(placed('3'), removed('3'))).toEqual([]);
		expect(results(placed('3'), removed('3'), { ...placed('3', 'subcortical'), id: 'again' })).toMatchObject([
			{ tag: '3', kind: 'subcortical', result: 'untested' }
		]);
		expect(results(placed('3'), removed('3'), withdrawn('3 removed'))).toMatchObject([{ tag: '3' }]);
		expect(results(placed('3'), withdrawn('3 placed'))).toEqual([]);
		const tested = [placed('7', 'subcortical'), ...trials(['anomia', 'anomia', 'anomia']), removed('7')];
		expect(results(tested)).toMatchObject([{ tag: '7', kind: 'subcortical', result: 'positive' }]);
		expect(caseOf(tested).tags.get('7')).toEqual({ tag: '7', kind: 'subcortical', placed: false });
	});

	it('"positive when any task, language or class is positive there"', () => {
		expect(results(trials(['dysarthria', 'dysarthria', 'intact']))).toMatchObject([
			{ result: 'positive', positive: ['speech-motor'] }
		]);
		const both = [presented('1'), scored('1', 'anomia', { also: ['dysarthria'] })];
		const one = entry('protocol-set', { rule: { minTrials: 1, share: [2, 3] } });
		expect(results(both, one)).toMatchObject([{ result: 'positive', positive: ['language', 'speech-motor'] }]);
	});

	it('"negative only when every task and language that the protocol requires is negative there"', () => {
		const wanted = [
			{ task: 'object-naming', language: 'en' },
			{ task: 'object-naming', language: 'de' }
		];
		const required = entry('protocol-set', { required: wanted });
		const english = trials(['intact', 'intact', 'intact']);
		const german = ['a', 'b', 'c'].flatMap((name) => trial(name, 'intact', { language: 'de' }));
		expect(results(english)).toMatchObject([{ result: 'negative', open: [] }]);
		expect(results(english, required)).toMatchObject([{ result: 'open', open: [wanted[1]] }]);
		expect(results(english, german, required)).toMatchObject([{ result: 'negative', open: [] }]);
	});

	it('"otherwise open, naming what is still to do" in the order of the rows, whatever the order of the log', () => {
		const log = [trial('1', 'intact', { task: 'reading' }), trial('2', 'intact', { task: 'counting' })];
		const open = ['counting', 'reading'].map((task) => ({ task, language: 'en' }));
		expect(results(...log)).toMatchObject([{ result: 'open', open }]);
		expect(results(...log.reverse())).toMatchObject([{ result: 'open', open }]);
	});
});

describe('entries of a later program', () => {
	const later = (type: string, v: number, data: object, id: string) =>
		({ ...entry('tag-placed', { tag: '1' }), id, type, v, data }) as unknown as LogEvent;

	it('"a page that meets one it does not know": types, versions and scores are named and have no effect', () => {
		const state = caseOf(
			trial('1', 'anomia'),
			later('tag-photographed', 1, { photo: 'x' }, 'type'),
			later('tag-placed', 2, { tag: '9' }, 'version'),
			later('trial-scored', 1, { trial: '1', score: 'hesitation', corrects: ['1 anomia'] }, 'score'),
			later('trial-scored', 1, { trial: '1', score: 'intact', also: ['hesitation'], corrects: [] }, 'also')
		);
		expect(state.unknown).toEqual([
			{ id: 'type', type: 'tag-photographed', version: 1 },
			{ id: 'version', type: 'tag-placed', version: 2 },
			{ id: 'score', type: 'trial-scored', version: 1 },
			{ id: 'also', type: 'trial-scored', version: 1 }
		]);
		expect(state.position).toBe(6);
		expect(sites(state).map(inShort)).toEqual(['7 1/1 (0) open']);
		expect(tagResults(state).map(({ tag }) => tag)).toEqual(['7']);
	});

	it('v: 1 is the same as no version', () => {
		expect(caseOf({ ...entry('tag-placed', { tag: '1' }), v: 1 }).unknown).toEqual([]);
	});

	it('one that is withdrawn is as if it had never been there, and one that waited is named once', () => {
		const unknown = [
			later('trial-scored', 2, { trial: '1' }, 'score'),
			later('tag-removed', 2, {}, 'removed'),
			later('entry-withdrawn', 2, {}, 'withdrawal')
		];
		expect(caseOf(unknown).unknown).toHaveLength(3);
		expect(
			caseOf(
				unknown,
				unknown.map(({ id }) => withdrawn(id))
			).unknown
		).toEqual([]);
		expect(fold(received(unknown), fold(unknown)).unknown).toHaveLength(3);
	});
});

describe('the log', () => {
	it('"the same id twice is one event"', () => {
		const log = received(trial('1', 'anomia'));
		expect(fold([...log, ...log])).toEqual(fold(log));
	});

	it('"position ... alone orders the log": an entry that waited stands where the log has it', () => {
		const own = entry('trial-corrected', { trial: '1', tag: '8' }, { id: 'own' });
		const other = entry('trial-corrected', { trial: '1', tag: '9' }, { id: 'other', device: 'tablet' });
		const [first, second, third, fourth] = received([...trial('1', 'anomia'), other, own]);
		const state = fold([own], fold([first!, second!]));
		expect(state.trials.get('1')?.tag).toBe('8');
		fold([third!], state);
		expect(state.trials.get('1')?.tag).toBe('8');
		const otherWay = received([...trial('1', 'anomia'), own, other]);
		expect(fold(otherWay.slice(2), fold([own], fold(otherWay.slice(0, 2)))).trials.get('1')?.tag).toBe('9');
		expect(fold([fourth!], state)).toEqual(fold([first!, second!, third!, fourth!]));
		expect(state).toMatchObject({ position: 4, waiting: [] });
	});

	it('"`at` ... never does"', () => {
		const eight = entry('trial-corrected', { trial: '1', tag: '8' }, { at: time(100) });
		const nine = entry('trial-corrected', { trial: '1', tag: '9' }, { at: time(50) });
		expect(language(trial('1', 'anomia'), eight, nine)).toEqual(['9 1/1 (0) open']);
	});

	it('"by ... default is who is signed in"', () => {
		const sent = caseOf(presented('1'), presented('2', {}, { by: 'account-of-who-acted' }));
		expect([...sent.trials.values()].map(({ by }) => by)).toEqual(['account-examiner', 'account-of-who-acted']);
		expect(fold([presented('1')]).trials.get('1')?.by).toBeNull();
	});
});
