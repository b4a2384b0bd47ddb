/**
 * The event contract once more, written the slow and plain way: the whole log is read at once, withdrawn entries are
 * struck out first, and every answer is worked out anew from the entries left standing. Nothing here is shared with the
 * fold but the closed lists of the trade, so that a mistake in one does not hide in the other.
 */
import type { EventData, EventType, LogEvent } from '../../../src/lib/mapping/events';
import {
	CLASSES,
	EXCLUDED_KINDS,
	LANGUAGE_KINDS,
	SPEECH_MOTOR_KINDS,
	type ResponseClass
} from '../../../src/lib/mapping/vocabulary';

export interface ModelRow {
	tag: string;
	task: string;
	language: string;
	verdict: 'untested' | 'open' | 'positive' | 'negative';
	disturbed: number;
	valid: number;
	excluded: number;
	settled: 'positive' | 'negative' | null;
	remaining: number;
	kinds: Record<string, number>;
	milliamps: [number, number] | null;
}

export interface ModelTag {
	tag: string;
	kind: 'cortical' | 'subcortical';
	result: ModelRow['verdict'];
	positive: ResponseClass[];
	open: { task: string; language: string }[];
}

/** What one trial is to its row: still waiting, left out, or one of the counted two. */
type Standing = 'pending' | 'excluded' | 'disturbed' | 'intact';

type EntryOf<T extends EventType> = Extract<LogEvent, { type: T }>;

/** Each entry once, in the order of the log; entries without a position are not in the log yet and come last. */
function inOrder(log: readonly LogEvent[]): LogEvent[] {
	const once = log.filter((entry, index) => log.findIndex((other) => other.id === entry.id) === index);
	const received = once.map((entry) => log.find((e) => e.id === entry.id && e.position !== undefined) ?? entry);
	const stored = received.filter((entry) => entry.position !== undefined);
	const waiting = received.filter((entry) => entry.position === undefined);
	return [...stored.sort((a, b) => a.position! - b.position!), ...waiting];
}

/**
 * The log as if every withdrawn entry had never been there. Read from the end: when a withdrawal is reached, everything
 * that could take it back has been read already.
 */
export function standingEntries(log: readonly LogEvent[]): LogEvent[] {
	const entries = inOrder(log);
	const struck = new Set<number>();
	for (let i = entries.length - 1; i >= 0; i--) {
		const entry = entries[i]!;
		if (entry.type !== 'entry-withdrawn' || struck.has(i)) continue;
		const target = entries.findIndex((other) => other.id === entry.data.entry);
		if (target !== -1 && target < i) struck.add(target);
	}
	return entries.filter((_, index) => !struck.has(index));
}

/** The whole log, read once; each question is answered by searching the standing entries again. */
export function readLog(log: readonly LogEvent[]) {
	const entries = standingEntries(log);

	function every<T extends EventType>(type: T): EntryOf<T>[] {
		return entries.filter((entry): entry is EntryOf<T> => entry.type === type);
	}

	const protocol = {
		rule: { minTrials: 3, share: [2, 3] as readonly [number, number] },
		effects: {} as Record<string, Record<string, string>>,
		later: 'excluded',
		required: [] as { task: string; language: string }[]
	};
	for (const { data } of every('protocol-set')) {
		if (data.rule !== undefined) protocol.rule = data.rule;
		if (data.effects !== undefined) protocol.effects = data.effects as typeof protocol.effects;
		if (data.later !== undefined) protocol.later = data.later;
		if (data.required !== undefined) protocol.required = data.required;
	}

	/** The presentations that count: the first one of each trial; a second one is ignored. */
	const presentations = every('trial-presented').filter(
		(entry, index, all) => all.findIndex((other) => other.data.trial === entry.data.trial) === index
	);

	/** A trial as presented, overridden field by field, the later in the log over the earlier. */
	function corrected(presented: EntryOf<'trial-presented'>): EventData['trial-presented'] {
		let data = presented.data;
		for (const correction of every('trial-corrected')) {
			if (correction.data.trial === data.trial) data = { ...data, ...correction.data };
		}
		return data;
	}

	/** Only mapping trials make rows; without a run the trial belongs to the mapping. */
	function isMapping(run: string | undefined): boolean {
		if (run === undefined) return true;
		const openings = every('run-opened').filter((entry) => entry.data.run === run);
		return openings.length > 0 && openings[openings.length - 1]!.data.purpose === 'mapping';
	}

	/** The scores of a trial that no other standing score names. */
	function standingScores(trial: string): EntryOf<'trial-scored'>[] {
		return every('trial-scored').filter(
			(score) =>
				score.data.trial === trial &&
				!every('trial-scored').some((other) => other !== score && other.data.corrects.includes(score.id))
		);
	}

	function inPause(at: string): boolean {
		const time = Date.parse(at);
		const pauses = [...new Set(every('pause-opened').map((entry) => entry.data.pause))];
		return pauses.some((pause) => {
			const opened = every('pause-opened').find((entry) => entry.data.pause === pause)!;
			const closed = every('pause-closed').find((entry) => entry.data.pause === pause);
			return Date.parse(opened.at) <= time && (closed === undefined || time < Date.parse(closed.at));
		});
	}

	/** Left out whatever its score says. */
	function isExcluded(presented: EntryOf<'trial-presented'>): boolean {
		const { trial, tag } = corrected(presented);
		return (
			every('trial-excluded').some((entry) => entry.data.trial === trial) ||
			every('trial-onset').some((entry) => entry.data.trial === trial && !entry.data.shown) ||
			every('stimulation-started').some(
				(entry) => entry.data.trial === trial && entry.data.tag !== null && entry.data.tag !== tag
			) ||
			inPause(presented.at)
		);
	}

	/** What one kind says to one class, and whether it is one of the excluded kinds, which win over all others. */
	function ofKind(kind: string, asked: ResponseClass): 'excluded-kind' | 'disturbed' | 'excluded-here' | 'intact' {
		const isExcludedKind = (EXCLUDED_KINDS as readonly string[]).includes(kind);
		const changed = protocol.effects[kind]?.[asked];
		if (changed === 'disturbed' || changed === 'intact') return changed;
		if (isExcludedKind) return 'excluded-kind';
		if (changed === 'excluded') return 'excluded-here';
		if (asked === 'language') {
			if ((LANGUAGE_KINDS as readonly string[]).includes(kind)) return 'disturbed';
			if (kind === 'anarthria' || kind === 'negative-motor') return 'excluded-here';
			return 'intact';
		}
		if ((SPEECH_MOTOR_KINDS as readonly string[]).includes(kind)) return 'disturbed';
		if (kind === 'speech-arrest' || kind === 'no-response') return 'excluded-here';
		return 'intact';
	}

	function ofScore(scored: EventData['trial-scored'], asked: ResponseClass): Standing {
		const movementLost = scored.movement?.tongue === 'lost' || scored.movement?.hand === 'lost';
		if (asked === 'language' && movementLost) return 'excluded';
		const said = [scored.score, ...(scored.also ?? [])].map((kind) => ofKind(kind, asked));
		if (said.includes('excluded-kind')) return 'excluded';
		if (said.includes('disturbed')) {
			return scored.when === 'later' && protocol.later === 'excluded' ? 'excluded' : 'disturbed';
		}
		return said.includes('excluded-here') ? 'excluded' : 'intact';
	}

	function standing(presented: EntryOf<'trial-presented'>, asked: ResponseClass): Standing {
		if (isExcluded(presented)) return 'excluded';
		const scores = standingScores(presented.data.trial);
		return scores.length === 1 ? ofScore(scores[0]!.data, asked) : 'pending';
	}

	/** The trials of the case's mapping that belong to a site, with their data as corrected. */
	function siteTrials(asked: ResponseClass) {
		return presentations
			.map((presented) => ({ presented, data: corrected(presented) }))
			.filter(({ data }) => isMapping(data.run) && data.stimulated && data.tag !== null)
			.filter(({ data }) => asked === 'speech-motor' || data.item !== null);
	}

	function result(disturbed: number, valid: number): ModelRow['verdict'] {
		const { minTrials, share } = protocol.rule;
		if (valid === 0) return 'untested';
		if (valid < minTrials) return 'open';
		return disturbed * share[1] >= valid * share[0] ? 'positive' : 'negative';
	}

	/** Tries out every way the remaining trials may go. */
	function settled(disturbed: number, valid: number): ModelRow['settled'] {
		if (result(disturbed, valid) !== 'open') return null;
		const remaining = protocol.rule.minTrials - valid;
		const ends = new Set<ModelRow['verdict']>();
		for (let more = 0; more <= remaining; more++) ends.add(result(disturbed + more, protocol.rule.minTrials));
		const [only] = ends;
		return ends.size === 1 && (only === 'positive' || only === 'negative') ? only : null;
	}

	function rows(asked: ResponseClass): ModelRow[] {
		const trials = siteTrials(asked);
		const keys = [...new Set(trials.map(({ data }) => JSON.stringify([data.tag, data.task, data.language])))];
		return keys.map((key) => {
			const [tag, task, language] = JSON.parse(key) as [string, string, string];
			const own = trials.filter(({ data }) => data.tag === tag && data.task === task && data.language === language);
			const valid = own.filter(({ presented }) => ['disturbed', 'intact'].includes(standing(presented, asked)));
			const disturbed = own.filter(({ presented }) => standing(presented, asked) === 'disturbed').length;
			const kinds: Record<string, number> = {};
			for (const { data } of valid) {
				const scored = standingScores(data.trial)[0]!.data;
				for (const kind of new Set([scored.score, ...(scored.also ?? [])])) {
					if (kind !== 'intact') kinds[kind] = (kinds[kind] ?? 0) + 1;
				}
			}
			const currents = valid.map(({ data }) => data.milliamps).filter((current) => current !== null);
			return {
				tag,
				task,
				language,
				verdict: result(disturbed, valid.length),
				disturbed,
				valid: valid.length,
				excluded: own.filter(({ presented }) => standing(presented, asked) === 'excluded').length,
				settled: settled(disturbed, valid.length),
				remaining: Math.max(0, protocol.rule.minTrials - valid.length),
				kinds,
				milliamps: currents.length > 0 ? [Math.min(...currents), Math.max(...currents)] : null
			};
		});
	}

	/** A tag's kind is what its last placing said; cortical when it said nothing or never came. */
	function kindOf(tag: string): ModelTag['kind'] {
		const placings = every('tag-placed').filter((entry) => entry.data.tag === tag);
		return placings[placings.length - 1]?.data.kind ?? 'cortical';
	}

	function tags(): ModelTag[] {
		const all = { language: rows('language'), 'speech-motor': rows('speech-motor') };
		const onTheCortex = entries.reduce((placed, { type, data }) => {
			if (type === 'tag-placed') return [...placed, data.tag];
			return type === 'tag-removed' ? placed.filter((tag) => tag !== data.tag) : placed;
		}, [] as string[]);
		const names = new Set([...onTheCortex, ...[...all.language, ...all['speech-motor']].map((row) => row.tag)]);
		return [...names].map((tag) => {
			const language = all.language.filter((row) => row.tag === tag);
			const speechMotor = all['speech-motor'].filter((row) => row.tag === tag);
			const positive = CLASSES.filter((asked) =>
				all[asked].some((row) => row.tag === tag && row.verdict === 'positive')
			);
			const asked = protocol.required.length > 0 ? protocol.required : language;
			const verdictOf = (wanted: { task: string; language: string }) =>
				language.find((row) => row.task === wanted.task && row.language === wanted.language)?.verdict ?? 'untested';
			const negative = asked.length > 0 && asked.every((wanted) => verdictOf(wanted) === 'negative');
			let result: ModelTag['result'] = 'open';
			if (positive.length > 0) result = 'positive';
			else if (language.length + speechMotor.length === 0) result = 'untested';
			else if (negative) result = 'negative';
			return {
				tag,
				kind: kindOf(tag),
				result,
				positive,
				open:
					result === 'open'
						? asked
								.filter((wanted) => ['untested', 'open'].includes(verdictOf(wanted)))
								.map(({ task, language }) => ({ task, language }))
						: []
			};
		});
	}

	return { entries, protocol, presentations, rows, tags, standingScores, standing };
}
