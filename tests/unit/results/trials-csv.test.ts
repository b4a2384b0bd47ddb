import { describe, expect, it } from 'vitest';
import type { LogEvent } from '../../../src/lib/mapping/events';
import { fold } from '../../../src/lib/mapping/fold';
import { TRIAL_COLUMNS } from '../../../src/lib/server/exports/trial-columns';
import { trialsCsv } from '../../../src/lib/server/exports/trials-csv';
import { entry, received, time } from '../mapping/entry';
import { readStrictly } from './strict-csv';

/** The rows of an exported log, each by its columns. */
function rowsOf(entries: LogEvent[], zone = 'UTC'): Record<string, string>[] {
	const [header = [], ...rows] = readStrictly(trialsCsv('tamu-rilo-38', fold(received(entries)), zone));
	return rows.map((row) => Object.fromEntries(header.map((column, index) => [column, row[index] ?? ''])));
}

const settings = { technique: 'bipolar 60 Hz', frequency: 60, pulseWidth: 1, probe: 'two balls, 5 mm' };
const presented = {
	trial: 'one',
	item: 'house',
	task: 'object-naming',
	language: 'en',
	tag: '7',
	stimulated: true,
	milliamps: 2.5
};

describe('the export of trials', () => {
	it('has all that was done and said of a trial, times in the zone of the clinic', () => {
		const [row] = rowsOf(
			[
				entry('protocol-set', { required: [{ task: 'object-naming', language: 'en' }], later: 'counted' }),
				entry('items-copied', {
					set: 'objects-en',
					version: '1',
					task: 'object-naming',
					language: 'en',
					leadIn: 'this is a',
					items: [{ id: 'house', answer: 'house', accepted: ['home'], prompts: [{ kind: 'text', text: 'x' }] }]
				}),
				entry('stimulation-settings', { ...settings, train: 4 }),
				entry('run-opened', { run: 'run-1', purpose: 'mapping' }),
				entry('trial-presented', { ...presented, run: 'run-1' }, { at: time(10), by: 'account-9' }),
				entry('trial-onset', {
					trial: 'one',
					shown: true,
					planned: time(11),
					measured: time(11, '+02:00'),
					source: 'presentation-time'
				}),
				entry(
					'trial-scored',
					{
						trial: 'one',
						score: 'semantic-paraphasia',
						also: ['delay', 'self-correction'],
						when: 'later',
						movement: { tongue: 'kept' },
						said: '=cabin, "the" hut',
						note: '+1\nlate',
						corrects: []
					},
					{ at: time(14) }
				)
			],
			'Europe/Berlin'
		);
		expect(row).toEqual({
			case: 'tamu-rilo-38',
			position: '5',
			trial: 'one',
			at: '2031-03-05T13:00:10.000+01:00',
			device: 'examiner',
			by: 'account-9',
			run: 'run-1',
			purpose: 'mapping',
			tag: '7',
			stimulated: 'true',
			milliamps: '2.5',
			technique: 'bipolar 60 Hz',
			frequency_hz: '60',
			pulse_width_ms: '1',
			probe: 'two balls, 5 mm',
			train_s: '4',
			task: 'object-naming',
			language: 'en',
			item: 'house',
			answer: 'house',
			score: 'semantic-paraphasia',
			also: 'delay self-correction',
			when: 'later',
			movement_tongue: 'kept',
			movement_hand: '',
			said: `'=cabin, "the" hut`,
			note: `'+1\nlate`,
			scored_at: '2031-03-05T13:00:14.000+01:00',
			scored_by: 'account-examiner',
			contested: 'false',
			contested_scores: '',
			pending: 'false',
			shown: 'true',
			onset_planned: '2031-03-05T13:00:11.000+01:00',
			onset_measured: '2031-03-05T13:00:11.000+01:00',
			onset_source: 'presentation-time',
			excluded: '',
			effect_language: 'disturbed',
			effect_speech_motor: 'intact',
			rule_min_trials: '3',
			rule_share_part: '2',
			rule_share_whole: '3',
			later: 'counted',
			effects: '{}',
			required: '[{"task":"object-naming","language":"en"}]'
		});
	});

	it('has one row a trial of every purpose in log order, and none for a presentation taken back', () => {
		const rows = rowsOf([
			entry('run-opened', { run: 'b', purpose: 'baseline' }),
			entry('trial-presented', { ...presented, trial: 'two', run: 'b', tag: null, stimulated: false, milliamps: null }),
			entry('trial-presented', presented),
			entry('trial-presented', { ...presented, trial: 'three', run: 'never opened' }),
			entry('trial-presented', { ...presented, trial: 'four' }, { id: 'mistake' }),
			entry('entry-withdrawn', { entry: 'mistake' })
		]);
		expect(rows.map(({ position, trial, purpose, tag }) => [position, trial, purpose, tag])).toEqual([
			['2', 'two', 'baseline', ''],
			['3', 'one', 'mapping', '7'],
			['4', 'three', '', '7']
		]);
	});

	it('tells a contested trial with both its scores, and an excluded one with every reason', () => {
		const [contested, excluded] = rowsOf([
			entry('trial-presented', presented),
			entry('trial-scored', { trial: 'one', score: 'intact', corrects: [] }),
			entry('trial-scored', { trial: 'one', score: 'anomia', corrects: [] }),
			entry('trial-presented', { ...presented, trial: 'two' }),
			entry('trial-onset', { trial: 'two', shown: false }),
			entry('trial-excluded', { trial: 'two', reason: 'afterdischarge' }),
			entry('stimulation-started', { stimulation: 's', trial: 'two', tag: '8', milliamps: 2, source: 'trigger' })
		]);
		expect(contested).toMatchObject({
			score: '',
			contested: 'true',
			contested_scores: 'intact anomia',
			pending: 'true',
			effect_language: 'pending',
			scored_by: ''
		});
		expect(excluded).toMatchObject({
			contested: 'false',
			pending: 'false',
			shown: 'false',
			excluded: 'not-shown; excluded: afterdischarge; other-tag: 8',
			effect_language: 'excluded'
		});
	});

	it('has the settings that held when the trial was presented, and not those of another technique', () => {
		const rows = rowsOf([
			entry('trial-presented', { ...presented, trial: 'before' }),
			entry('stimulation-settings', settings),
			entry('trial-presented', { ...presented, trial: 'first' }),
			entry('stimulation-settings', { ...settings, technique: 'train of five', frequency: 250 }, { id: 'second' }),
			entry('trial-presented', { ...presented, trial: 'second' }),
			entry('trial-presented', { ...presented, trial: 'named', technique: 'bipolar 60 Hz' }),
			entry('trial-presented', { ...presented, trial: 'other', technique: 'monopolar' }),
			entry('entry-withdrawn', { entry: 'second' })
		]);
		expect(rows.map(({ trial, technique, frequency_hz }) => [trial, technique, frequency_hz])).toEqual([
			['before', '', ''],
			['first', 'bipolar 60 Hz', '60'],
			['second', 'bipolar 60 Hz', '60'],
			['named', 'bipolar 60 Hz', '60'],
			['other', 'monopolar', '']
		]);
	});

	it('has its columns even without a trial', () => {
		expect(trialsCsv('tamu-rilo-38', fold([]), 'UTC')).toBe(`${TRIAL_COLUMNS.join(',')}\r\n`);
	});
});
