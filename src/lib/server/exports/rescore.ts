import { effect, type EffectProtocol, type Scored } from '../../mapping/effect';
import { compareTags } from '../../mapping/sites';
import { verdict, type SiteVerdict } from '../../mapping/verdict';
import type { Effect } from '../../mapping/vocabulary';
import { writeCsv } from './csv';
import { readTrials, type TrialRow } from './read-trials';

const COLUMNS = ['tag', 'task', 'language', 'disturbed', 'valid', 'excluded', 'verdict'] as const;

/** A result as the file's own trials and protocol give it, class language. */
export type Rescored = { tag: string; task: string; language: string } & Pick<
	SiteVerdict,
	'disturbed' | 'valid' | 'excluded' | 'verdict'
>;

export interface Rescoring {
	results: Rescored[];
	/** rows of the file whose exported effect is not what their score gives */
	differing: { line: number; exported: string; found: string }[];
}

/**
 * Works out the verdicts of an exported file of trials anew, from its scores and the protocol it carries.
 *
 * @param text the file
 * @throws UnreadableExport
 */
export function rescore(text: string): Rescoring {
	const trials = readTrials(text).map((row) => ({ row, found: effectOf(row) }));
	const groups = new Map<string, { row: TrialRow & { tag: string }; effects: Effect[] }>();
	for (const { row, found } of trials) {
		if (!countsForSite(row)) continue;
		const key = JSON.stringify([row.tag, row.task, row.language]);
		const group = groups.get(key) ?? { row, effects: [] };
		groups.set(key, group);
		if (found !== 'pending') group.effects.push(found);
	}
	return {
		results: [...groups.values()].map(({ row, effects }) => resultOf(row, effects)).sort(inOrder),
		differing: trials
			.filter(({ row, found }) => row.effect_language !== found)
			.map(({ row, found }) => ({ line: row.line, exported: row.effect_language, found }))
	};
}

/** The results as CSV. */
export function rescoredCsv(results: readonly Rescored[]): string {
	return writeCsv(COLUMNS, results);
}

/** A stimulated trial of the mapping, about language: one with an item. */
function countsForSite(row: TrialRow): row is TrialRow & { tag: string } {
	return row.purpose === 'mapping' && row.stimulated && row.tag !== null && row.item !== null;
}

function effectOf(row: TrialRow): Effect | 'pending' {
	if (row.excluded !== '' || row.shown === false) return 'excluded';
	if (row.score === null || row.contested) return 'pending';
	const scored: Scored = {
		score: row.score,
		also: row.also,
		when: row.when ?? undefined,
		movement: { tongue: row.movement_tongue ?? undefined, hand: row.movement_hand ?? undefined }
	};
	const protocol: EffectProtocol = { effects: row.effects, later: row.later };
	return effect(scored, { protocol });
}

function resultOf({ tag, task, language, ...row }: TrialRow & { tag: string }, effects: Effect[]): Rescored {
	const result = verdict(effects, {
		minTrials: row.rule_min_trials,
		share: [row.rule_share_part, row.rule_share_whole]
	});
	const { disturbed, valid, excluded } = result;
	return { tag, task, language, disturbed, valid, excluded, verdict: result.verdict };
}

function inOrder(a: Rescored, b: Rescored): number {
	return compareTags(a.tag, b.tag) || compareText(a.task, b.task) || compareText(a.language, b.language);
}

function compareText(a: string, b: string): number {
	return a < b ? -1 : a > b ? 1 : 0;
}
