import type { EventData, LogEvent } from '$lib/mapping/events';
import { TAG_KIND_NAMES } from './cases';
import { milliamps } from './format';
import { CLASS_NAMES, EFFECT_NAMES, KIND_NAMES, languageName, PURPOSE_NAMES, taskName } from './trade';

/** Entries of the case log in the clinic's words. */

/** How an entry's words learn what it names. */
export interface LogNames {
	/** the answer of an item, or its id where the case has no such item */
	item(id: string): string;
	/** the data that presented a trial; null when it is not in the log */
	trial(id: string): EventData['trial-presented'] | null;
	/** an entry named by another one; null when it is not in the log */
	entry(id: string): LogEvent | null;
}

type Words = { [T in keyof EventData]: (data: EventData[T], names: LogNames) => string };

function list(parts: (string | null | undefined | false)[]): string {
	return parts.filter(Boolean).join(', ');
}

/** "umbrella, tag 7": which trial is meant. */
function trialWords(id: string, names: LogNames): string {
	const trial = names.trial(id);
	if (!trial) return 'a trial that is not in the log';
	const what = trial.item === null ? 'stimulation without language' : names.item(trial.item);
	const where = trial.tag === null ? (trial.stimulated ? null : 'no stimulation') : `tag ${trial.tag}`;
	return list([what, where, trial.tag !== null && !trial.stimulated && 'control']);
}

function seconds(milliseconds: number): string {
	return `${milliseconds / 1000} s`;
}

function protocolWords(data: EventData['protocol-set']): string {
	const { rule, effects, later, required, kinds, timing } = data;
	const parts: string[] = [];
	if (rule)
		parts.push(`at least ${rule.minTrials} trials, positive from ${rule.share[0]} of ${rule.share[1]} disturbed`);
	if (kinds) parts.push(`error kinds with a key: ${kinds.map((kind) => KIND_NAMES[kind]).join(', ') || 'none'}`);
	if (effects) {
		const changed = Object.entries(effects).flatMap(([kind, classes]) =>
			Object.entries(classes).map(
				([asked, effect]) =>
					`${KIND_NAMES[kind as keyof typeof KIND_NAMES]} is ${EFFECT_NAMES[effect]} for ${CLASS_NAMES[asked as keyof typeof CLASS_NAMES]}`
			)
		);
		parts.push(changed.length > 0 ? changed.join(', ') : 'every error kind as usual');
	}
	if (later) parts.push(`errors later than 4 s ${later === 'counted' ? 'count' : 'do not count'}`);
	if (required) {
		const pairs = required.map(({ task, language }) => `${taskName(task)} in ${languageName(language)}`);
		parts.push(pairs.length > 0 ? `required: ${pairs.join(', ')}` : 'no task is required');
	}
	if (timing) {
		const shown = timing.shown === null ? 'until taken off' : seconds(timing.shown);
		parts.push(`on the screen ${shown}, pause ${seconds(timing.pause)}, sent ${timing.lead} ms ahead`);
	}
	return `Protocol: ${parts.join('; ') || 'unchanged'}`;
}

const WORDS: Words = {
	'tag-placed': ({ tag, kind }) => list([`Tag ${tag} laid`, kind === 'subcortical' && TAG_KIND_NAMES[kind]]),
	'tag-removed': ({ tag }) => `Tag ${tag} taken off`,
	'protocol-set': protocolWords,
	'stimulation-settings': (data) =>
		`Stimulation: ${list([data.technique, `${data.frequency} Hz`, `${data.pulseWidth} ms a phase`, data.probe, data.note])}`,
	'run-opened': ({ purpose }) => `Run begun: ${PURPOSE_NAMES[purpose]}`,
	'run-closed': () => 'Run ended',
	'trial-presented': (data, names) =>
		`Shown: ${list([trialWords(data.trial, names), data.milliamps !== null && milliamps(data.milliamps)])}`,
	'trial-onset': ({ trial, shown, reason }, names) =>
		`${trialWords(trial, names)}: ${shown ? 'was on the screen' : list(['was not shown', reason])}`,
	'trial-scored': ({ trial, score, also, when, movement, said, note, corrects }, names) =>
		`${trialWords(trial, names)}: ${list([
			...[score, ...(also ?? [])].map((kind) => KIND_NAMES[kind]),
			when === 'later' && 'later than 4 s',
			movement?.tongue === 'lost' && 'tongue movement lost',
			movement?.hand === 'lost' && 'hand movement lost',
			said && `said "${said}"`,
			note,
			corrects.length > 0 && 'corrects the score before'
		])}`,
	'trial-corrected': ({ trial, ...change }, names) =>
		`${trialWords(trial, names)}: corrected to ${list([
			change.tag !== undefined && (change.tag === null ? 'no tag' : `tag ${change.tag}`),
			change.stimulated !== undefined && (change.stimulated ? 'stimulated' : 'control'),
			change.milliamps !== undefined && (change.milliamps === null ? 'no current' : milliamps(change.milliamps)),
			change.item !== undefined && (change.item === null ? 'no item' : names.item(change.item)),
			change.task !== undefined && taskName(change.task),
			change.language !== undefined && languageName(change.language)
		])}`,
	'trial-excluded': ({ trial, reason }, names) => `${trialWords(trial, names)}: not counted, ${reason}`,
	'entry-withdrawn': ({ entry, reason }, names) => {
		const target = names.entry(entry);
		if (!target) return 'Taken back: an entry that is not in the log';
		if (target.type !== 'entry-withdrawn') return list([`Taken back: ${logWords(target, names)}`, reason]);
		const first = names.entry(target.data.entry);
		return list([`Put back: ${first ? logWords(first, names) : 'an entry that is not in the log'}`, reason]);
	},
	'pause-opened': ({ reason }) => `Pause begun: ${reason}`,
	'pause-closed': () => 'Pause ended',
	'stimulation-started': ({ tag, milliamps: current, source }) =>
		`Stimulation begun: ${list([tag !== null && `tag ${tag}`, current !== null && milliamps(current), source])}`,
	'stimulation-ended': () => 'Stimulation ended',
	'items-copied': ({ set, version, task, language, items }) =>
		`Items added: ${items.length} for ${taskName(task)} in ${languageName(language)}, from ${set} ${version}`,
	'item-decided': ({ item, keep, reason }, names) => list([`${names.item(item)}: ${keep ? 'kept' : 'dropped'}`, reason])
};

/** One entry in a sentence. */
export function logWords(event: LogEvent, names: LogNames): string {
	// A type of a newer Wordkeep has no words here.
	const words = WORDS[event.type] as ((data: unknown, names: LogNames) => string) | undefined;
	return words ? words(event.data, names) : `An entry this page does not know (${event.type})`;
}

export const LOG_PART = {
	caption: 'Case log, the newest entry first',
	search: 'Search the case log',
	entry: 'Entry',
	when: 'When',
	who: 'Who',
	what: 'What',
	waiting: 'waiting to be sent',
	patientView: 'patient view',
	colleague: 'a colleague',
	takenBack: 'taken back',
	emptyTitle: 'Nothing is noted in this case yet',
	emptyText: 'Whatever is prepared, shown and scored stands here, and stays.'
};
