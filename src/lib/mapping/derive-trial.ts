import { dataOf, isDuring, standing, type CaseState, type Entry, type ExclusionReason, type Trial } from './case-state';
import { effect } from './effect';
import type { EventData } from './events';
import type { Effect, Purpose, ResponseClass } from './vocabulary';

type Presented = EventData['trial-presented'];

/** The trial with this id as the log has it now, or null when no entry that presented it stands. */
export function deriveTrial(state: CaseState, id: string): Trial | null {
	const record = state.records.get(id);
	const first = record?.presented.find((entry) => !entry.withdrawn);
	if (!record || !first) return null;

	const presented = corrected(dataOf(first, 'trial-presented'), record.corrected);
	const scores = standing(record.scores).filter((score) => !isReplaced(state, score));
	const [only] = scores;
	const score = only && scores.length === 1 ? dataOf(only, 'trial-scored') : null;
	const onsets = standing(record.onsets).map((entry) => dataOf(entry, 'trial-onset'));
	const excluded: ExclusionReason[] = [
		...onsets
			.filter((onset) => !onset.shown)
			.map(({ reason }) => ({ why: 'not-shown', detail: reason ?? null }) as const),
		...standing(record.exclusions).map(
			(entry) => ({ why: 'excluded', detail: dataOf(entry, 'trial-excluded').reason }) as const
		),
		...pausesAround(state, first.event.at),
		...stimulatedElsewhere(record.stimulations, presented.tag)
	];

	return {
		id,
		entry: first.event.id,
		order: first.order,
		at: first.event.at,
		device: first.event.device,
		by: first.event.by ?? first.event.sender ?? null,
		item: presented.item,
		task: presented.task,
		language: presented.language,
		tag: presented.tag,
		stimulated: presented.stimulated,
		milliamps: presented.milliamps,
		technique: presented.technique ?? null,
		run: presented.run ?? null,
		purpose: purposeOf(state, presented.run),
		score,
		standing: scores.map((entry) => entry.event.id),
		contested: scores.length > 1,
		shown: onsets.length === 0 ? null : onsets.every((onset) => onset.shown),
		excluded,
		effect: effects(state, score, excluded.length > 0)
	};
}

function corrected(presented: Presented, corrections: Entry[]): Presented {
	const changes = standing(corrections);
	if (changes.length === 0) return presented;
	return Object.assign({ ...presented }, ...changes.map((entry) => given(dataOf(entry, 'trial-corrected'))));
}

/** A field that is there without a value is not given: it is gone once the entry has been sent. */
function given<T extends object>(data: T): Partial<T> {
	return Object.fromEntries(Object.entries(data).filter(([, value]) => value !== undefined)) as Partial<T>;
}

/** A score stands until one that names it arrives; a score that names itself replaces nothing. */
function isReplaced(state: CaseState, score: Entry): boolean {
	const by = state.replacements.get(score.event.id);
	return by !== undefined && by.some((other) => other !== score && !other.withdrawn);
}

function pausesAround(state: CaseState, at: string): ExclusionReason[] {
	if (state.pauses.size === 0) return [];
	const time = Date.parse(at);
	const found: ExclusionReason[] = [];
	for (const pause of state.pauses.values()) {
		if (isDuring(pause, time)) found.push({ why: 'pause', detail: pause.reason });
	}
	return found;
}

/** A stimulator that says another tag than the trial does; no tag on its side disagrees with nothing. */
function stimulatedElsewhere(stimulations: Entry[], tag: string | null): ExclusionReason[] {
	return standing(stimulations)
		.map((entry) => dataOf(entry, 'stimulation-started').tag)
		.filter((other) => other !== null && other !== tag)
		.map((other) => ({ why: 'other-tag', detail: other as string }));
}

/** Without a run a trial belongs to the case's mapping; with one that was not opened yet, to nothing yet. */
function purposeOf(state: CaseState, run: string | undefined): Purpose | null {
	if (run === undefined) return 'mapping';
	return state.runs.get(run)?.purpose ?? null;
}

function effects(
	state: CaseState,
	score: EventData['trial-scored'] | null,
	excluded: boolean
): Record<ResponseClass, Effect | 'pending'> {
	const one = (asked: ResponseClass): Effect | 'pending' => {
		if (excluded) return 'excluded';
		return score ? effect(score, { protocol: state.protocol, class: asked }) : 'pending';
	};
	return { language: one('language'), 'speech-motor': one('speech-motor') };
}
