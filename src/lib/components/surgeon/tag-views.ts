import type { CaseState, Row } from '$lib/mapping/case-state';
import { decidingRow } from '$lib/mapping/deciding-row';
import type { TaskLanguage } from '$lib/mapping/events';
import { effectsOfRow } from '$lib/mapping/row-effects';
import { rowKey } from '$lib/mapping/rows';
import { tagResults, type TagResult } from '$lib/mapping/sites';
import { taskLanguages } from '$lib/mapping/task-languages';
import type { SiteVerdict, Verdict } from '$lib/mapping/verdict';
import type { Effect, Score } from '$lib/mapping/vocabulary';

/** One task and language at one tag. */
export interface PairView extends TaskLanguage {
	verdict: Verdict;
	effects: Effect[];
}

/** A tag as the surgeon sees it. */
export interface TagView extends TagResult {
	/** what the trials of the row that decides say, in order */
	effects: Effect[];
	/** the result of that row; null without one */
	row: SiteVerdict | null;
	/** the error seen most often in that row, or null */
	error: Score | null;
	/** every task and language of the case, in one order for all tags */
	pairs: PairView[];
}

export function tagViews(state: CaseState): TagView[] {
	const pairs = taskLanguages(state);
	return tagResults(state).map((result) => {
		const deciding = decidingRow(state, result);
		return {
			...result,
			effects: deciding ? effectsOfRow(state, deciding.row, deciding.class) : [],
			row: deciding?.row ?? null,
			error: deciding ? mostFrequent(deciding.row) : null,
			pairs: pairs.map((pair) => pairView(state, result.tag, pair))
		};
	});
}

function pairView(state: CaseState, tag: string, { task, language }: TaskLanguage): PairView {
	const row = state.rows.language.get(rowKey({ tag, task, language }));
	return { task, language, verdict: row?.verdict ?? 'untested', effects: row ? effectsOfRow(state, row) : [] };
}

function mostFrequent({ kinds }: Row): Score | null {
	const [first] = Object.entries(kinds).sort(([, a], [, b]) => b - a);
	return first ? (first[0] as Score) : null;
}

/** How many tags have each result. */
export function countResults(tags: readonly Pick<TagResult, 'result'>[]): Record<Verdict, number> {
	const counts: Record<Verdict, number> = { positive: 0, negative: 0, open: 0, untested: 0 };
	for (const { result } of tags) counts[result]++;
	return counts;
}
