import { caseItems, type KeptItem } from './case-items';
import type { CaseState, Trial } from './case-state';
import { wilson } from './statistics/wilson';
import type { Score } from './vocabulary';

/** What one round says of an item. */
export type RoundAnswer = 'right' | 'wrong' | 'not-counted' | 'pending';

/** One item in one baseline round. */
export interface RoundRecord {
	run: string;
	trial: string;
	answer: RoundAnswer;
	score: Score | null;
	said: string | null;
}

/** One item of the case with its record in the baseline. */
export interface BaselineItem {
	item: KeptItem;
	/** one a round, in the order of the rounds; null where the item was not shown */
	rounds: (RoundRecord | null)[];
	/** what the rule "right and in time in every round" says; null before the first answer that counts */
	proposal: 'keep' | 'drop' | null;
}

/** Errors without stimulation, with the 95 % Wilson interval; null without an answer that counts. */
export interface BaselineRate {
	wrong: number;
	counted: number;
	interval: [number, number];
}

const NOT_COUNTED: readonly Score[] = ['not-scorable', 'afterdischarge', 'seizure', 'wrong-spot', 'inattentive'];

/** Right and in time is `intact` alone: a delay or a self-correction is an item not to rely on in theatre. */
function answerOf(trial: Trial): RoundAnswer {
	if (trial.excluded.length > 0 || trial.shown === false) return 'not-counted';
	if (!trial.score) return 'pending';
	const scores = [trial.score.score, ...(trial.score.also ?? [])];
	if (scores.some((score) => NOT_COUNTED.includes(score))) return 'not-counted';
	return scores.every((score) => score === 'intact') ? 'right' : 'wrong';
}

/**
 * The baseline rounds of the case: its runs of that purpose, in the order they were opened. One that was closed before
 * its first item was shown is none.
 */
export function baselineRounds(state: CaseState): string[] {
	return [...state.runs.values()]
		.filter(({ run, purpose, open }) => purpose === 'baseline' && (open || hasTrials(state, run)))
		.map(({ run }) => run);
}

function hasTrials(state: CaseState, run: string): boolean {
	return [...(state.trialsOfRun.get(run) ?? [])].some((trial) => state.trials.has(trial));
}

/** Every item of the case with its record, in the order the items were copied. */
export function baselineItems(state: CaseState): BaselineItem[] {
	const rounds = baselineRounds(state);
	const records = new Map<string, RoundRecord>();
	for (const trial of state.trials.values()) {
		if (trial.purpose !== 'baseline' || trial.run === null || trial.item === null) continue;
		const { score, said } = trial.score ?? {};
		const record = { run: trial.run, trial: trial.id, answer: answerOf(trial) };
		const key = keyOf(trial.run, { id: trial.item, task: trial.task, language: trial.language });
		// Shown again in one round: the first answer that counts holds, an answer that does not count gives way.
		const known = records.get(key);
		if (known && known.answer !== 'not-counted') continue;
		records.set(key, { ...record, score: score ?? null, said: said ?? null });
	}
	return caseItems(state).map((item) => {
		const own = rounds.map((run) => records.get(keyOf(run, item)) ?? null);
		return { item, rounds: own, proposal: propose(own) };
	});
}

function keyOf(run: string, { id, task, language }: Pick<KeptItem, 'id' | 'task' | 'language'>): string {
	return `${run} ${id} ${task} ${language}`;
}

function propose(rounds: (RoundRecord | null)[]): 'keep' | 'drop' | null {
	const answers = rounds.map((round) => round?.answer);
	if (answers.includes('wrong')) return 'drop';
	return answers.includes('right') ? 'keep' : null;
}

/** How often the patient erred in the baseline, over the items given. */
export function baselineRate(items: readonly BaselineItem[]): BaselineRate | null {
	const answers = items.flatMap(({ rounds }) => rounds.map((round) => round?.answer));
	const wrong = answers.filter((answer) => answer === 'wrong').length;
	const counted = wrong + answers.filter((answer) => answer === 'right').length;
	return counted === 0 ? null : { wrong, counted, interval: wilson(wrong, counted) };
}

/**
 * The item that a round shows next: the first kept one, in the order they were copied, without an answer that counts;
 * those that were skipped, or whose answer did not count, come after the others.
 *
 * @returns null when every kept item has its answer
 */
export function nextInRound(
	items: readonly BaselineItem[],
	round: number,
	skipped: ReadonlySet<string> = new Set()
): BaselineItem | null {
	const open = items.filter(({ item, rounds }) => {
		const answer = rounds[round]?.answer;
		return item.kept && answer !== 'right' && answer !== 'wrong';
	});
	const fresh = open.filter(({ item, rounds }) => !rounds[round] && !skipped.has(item.id));
	return fresh[0] ?? open[0] ?? null;
}
