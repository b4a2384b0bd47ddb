import { describe, expect, test } from 'vitest';
import { EVENT_TYPES, type EventData, type LogEvent } from '../../../src/lib/mapping/events';
import { fold } from '../../../src/lib/mapping/fold';
import { logWords } from '../../../src/lib/messages/case-log';
import { logNames } from '../../../src/routes/(team)/cases/[code]/log-names';

const TRIAL = { item: 'obj-umbrella', task: 'object-naming', language: 'en' } as const;
const DATA: { [T in keyof EventData]: [EventData[T], string] } = {
	'tag-placed': [{ tag: '7', kind: 'subcortical' }, 'Tag 7 laid, subcortical'],
	'tag-removed': [{ tag: '7' }, 'Tag 7 taken off'],
	'protocol-set': [
		{ rule: { minTrials: 4, share: [2, 3] }, effects: { dysarthria: { language: 'disturbed' } }, required: [] },
		'Protocol: at least 4 trials, positive from 2 of 3 disturbed; dysarthria is disturbed for language; no task is required'
	],
	'stimulation-settings': [
		{ technique: 'bipolar', frequency: 60, pulseWidth: 0.5, probe: '5 mm' },
		'Stimulation: bipolar, 60 Hz, 0.5 ms a phase, 5 mm'
	],
	'run-opened': [{ run: 'r', purpose: 'baseline' }, 'Run begun: baseline'],
	'run-closed': [{ run: 'r' }, 'Run ended'],
	'trial-presented': [
		{ trial: 't', ...TRIAL, tag: '7', stimulated: true, milliamps: 3 },
		'Shown: umbrella, tag 7, 3.0 mA'
	],
	'trial-onset': [{ trial: 't', shown: false, reason: 'arrived late' }, 'umbrella, tag 7: was not shown, arrived late'],
	'trial-scored': [
		{ trial: 't', score: 'anomia', said: 'this is a', corrects: [] },
		'umbrella, tag 7: anomia, said "this is a"'
	],
	'trial-corrected': [{ trial: 't', tag: '8', milliamps: 2.5 }, 'umbrella, tag 7: corrected to tag 8, 2.5 mA'],
	'trial-excluded': [{ trial: 't', reason: 'afterdischarge' }, 'umbrella, tag 7: not counted, afterdischarge'],
	'entry-withdrawn': [{ entry: 'tag-placed' }, 'Taken back: Tag 7 laid, subcortical'],
	'pause-opened': [{ pause: 'p', reason: 'rest' }, 'Pause begun: rest'],
	'pause-closed': [{ pause: 'p' }, 'Pause ended'],
	'stimulation-started': [
		{ stimulation: 's', tag: '7', milliamps: 3, source: 'hand' },
		'Stimulation begun: tag 7, 3.0 mA, hand'
	],
	'stimulation-ended': [{ stimulation: 's' }, 'Stimulation ended'],
	'items-copied': [
		{
			set: 'objects-en',
			version: '1.0.0',
			task: 'object-naming',
			language: 'en',
			leadIn: null,
			items: [{ id: 'obj-umbrella', answer: 'umbrella', accepted: [], prompts: [{ kind: 'text', text: 'x' }] }]
		},
		'Items added: 1 for object naming in English, from objects-en 1.0.0'
	],
	'item-decided': [
		{ item: 'obj-umbrella', task: 'object-naming', language: 'en', keep: false, reason: 'baseline' },
		'umbrella: dropped, baseline'
	]
};

const log = EVENT_TYPES.map(
	(type, index) =>
		({
			id: type,
			type,
			at: '2026-05-04T09:00:00Z',
			device: 'a',
			monotonic: 0,
			data: DATA[type][0],
			position: index + 1
		}) as LogEvent
);
const names = logNames(fold(log));

describe('an entry in the words of the clinic', () => {
	test.each(log.map((event) => [event.type, event] as const))('%s', (type, event) => {
		expect(logWords(event, names)).toBe(DATA[type][1]);
	});

	test('taking back a taking back is putting back', () => {
		const again = { ...log[0]!, id: 'again', type: 'entry-withdrawn', data: { entry: 'entry-withdrawn' } } as LogEvent;
		expect(logWords(again, names)).toBe('Put back: Tag 7 laid, subcortical');
	});

	test('a trial and an entry that are not in the log are said to be missing', () => {
		const score = { ...log[0]!, type: 'trial-scored', data: { trial: 'x', score: 'intact', corrects: [] } } as LogEvent;
		expect(logWords(score, names)).toBe('a trial that is not in the log: intact');
		const withdrawal = { ...log[0]!, type: 'entry-withdrawn', data: { entry: 'x' } } as LogEvent;
		expect(logWords(withdrawal, names)).toBe('Taken back: an entry that is not in the log');
	});

	test('an entry of a newer Wordkeep says that it is not known', () => {
		const newer = { ...log[0]!, type: 'margin-drawn', data: {} } as unknown as LogEvent;
		expect(logWords(newer, names)).toBe('An entry this page does not know (margin-drawn)');
	});
});
