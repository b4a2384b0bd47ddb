import type { CaseState } from '$lib/mapping/case-state';
import type { TaskLanguage } from '$lib/mapping/events';
import { taskLanguages } from '$lib/mapping/task-languages';
import type { Hemisphere } from '$lib/mapping/vocabulary';
import {
	againName,
	caseLine,
	circumstances,
	countName,
	outcome,
	pairName,
	progress,
	subject,
	SURGEON,
	toGoAt,
	willBePositive
} from '$lib/messages/surgeon';
import { toGo, toTestAgain, withoutScore, type ToGo } from './attention';
import type { Line, Part } from './fit-line';
import { lastTrial } from './last-trial';
import { countResults, type TagView } from './tag-views';

/** One line of the screen. */
export interface ScreenLine extends Line {
	key: string;
	place: 'top' | 'bottom';
}

const part = (text: string, tone: Part['tone'] = 'ink'): Part => ({ text, tone });

/** The last trial in one line. */
export function lastTrialLine(state: CaseState): ScreenLine {
	const last = lastTrial(state);
	const line = { key: 'last', place: 'top' } as const;
	if (!last) return { ...line, parts: [part(SURGEON.noTrial, 'mute')] };
	const { trial, status, row } = last;
	const disturbed = status === 'scored' && trial.effect[last.class] === 'disturbed';
	return {
		...line,
		parts: [
			part(subject(trial)),
			...outcome(trial, status).map((words): Part => ({ ...words, tone: disturbed ? 'ember' : 'ink' })),
			...(row ? progress(row, last.class) : []).map((words): Part => ({ ...words, tone: 'mute' })),
			...circumstances(trial, hasSeveralLanguages(state)).map((text) => part(text, 'mute'))
		]
	};
}

/** The lines shown when there is room for them, the most wanted first. */
export function wishedLines(
	state: CaseState,
	tags: readonly TagView[],
	header: { code: string; hemisphere: Hemisphere; languages: string[] }
): ScreenLine[] {
	return [
		againLine(state),
		waitingLine(state),
		countsLine(tags),
		...toGoLines(state),
		{
			key: 'case',
			place: 'bottom' as const,
			parts: caseLine(header, state.protocol.rule).map((text) => part(text, 'mute'))
		}
	].filter(({ parts }) => parts.length > 0);
}

function countsLine(tags: readonly TagView[]): ScreenLine {
	const { positive, negative, open, untested } = countResults(tags);
	return {
		key: 'counts',
		place: 'top',
		parts:
			tags.length === 0
				? []
				: [
						part(countName('positive', positive), positive > 0 ? 'ember' : 'mute'),
						part(countName('negative', negative), negative > 0 ? 'frost' : 'mute'),
						part(countName('open', open), 'mute'),
						...(untested > 0 ? [part(countName('untested', untested), 'mute')] : [])
					]
	};
}

/** The task and language stand once, before the first tag of theirs. */
function againLine(state: CaseState): ScreenLine {
	const several = taskLanguages(state).length > 1;
	const again = toTestAgain(state).map((one) => ({ one, pair: several ? pairText(state, one) : null }));
	const parts = again.map(({ one, pair }, index): Part => ({
		text: againName(one, pair === again[index - 1]?.pair ? null : pair),
		short: againName(one, null),
		tone: 'ink'
	}));
	return {
		key: 'again',
		place: 'bottom',
		parts: parts.length === 0 ? [] : [part(SURGEON.testAgain), ...parts],
		more: SURGEON.more
	};
}

/** Trials that wait for a score or have two; the one named as the last trial is not said twice. */
function waitingLine(state: CaseState): ScreenLine {
	const last = lastTrial(state)?.trial.id;
	const { notScored, contested } = withoutScore(state);
	const list = (title: string, trials: typeof notScored) => {
		const others = trials.filter(({ id }) => id !== last);
		return others.length === 0 ? [] : [part(`${title}: ${others.map(subject).join(', ')}`)];
	};
	return {
		key: 'waiting',
		place: 'bottom',
		parts: [...list(SURGEON.contested, contested), ...list(SURGEON.notScored, notScored)],
		more: SURGEON.more
	};
}

/** One line for each task and language: it explains the bars too, where there are any. */
function toGoLines(state: CaseState): ScreenLine[] {
	const pairs = toGo(state);
	return pairs.map((pair, index) => ({
		key: `to-go-${pair.task}-${pair.language}`,
		place: 'bottom',
		parts:
			pairs.length > 1
				? [part(SURGEON.bar(index + 1, pairText(state, pair))), ...toGoParts(pair, [part(SURGEON.complete, 'mute')])]
				: toGoParts(pair, []),
		more: SURGEON.evenMore
	}));
}

function toGoParts({ trials, willBePositive: tags }: ToGo, nothing: Part[]): Part[] {
	if (trials.length === 0) return nothing;
	return [
		...(tags.length > 0 ? [part(willBePositive(tags))] : []),
		...trials.map(({ remaining, tags }) => part(toGoAt(remaining, tags), 'mute'))
	];
}

function pairText(state: CaseState, pair: TaskLanguage): string {
	return pairName(pair, hasSeveralLanguages(state));
}

function hasSeveralLanguages(state: CaseState): boolean {
	return new Set(taskLanguages(state).map(({ language }) => language)).size > 1;
}

/**
 * Which lines are wished for, in order: every line once, the most wanted first, then those that need a second line.
 *
 * @param overflows whether a line has parts that do not fit on one line
 * @returns keys of lines; the last trial stands on its first line anyway
 */
export function wishOrder(
	last: ScreenLine,
	lines: readonly ScreenLine[],
	overflows: (line: ScreenLine) => boolean
): string[] {
	const second = [last, ...lines].filter(overflows).map(({ key }) => key);
	return [...lines.map(({ key }) => key), ...second];
}
