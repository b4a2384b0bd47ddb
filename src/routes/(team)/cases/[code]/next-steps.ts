import { baselineRounds } from '$lib/mapping/baseline';
import { caseItems } from '$lib/mapping/case-items';
import type { CaseState } from '$lib/mapping/case-state';
import { tagResults } from '$lib/mapping/sites';

export const STEPS = ['prepare', 'baseline', 'theatre', 'results'] as const;
export type StepName = (typeof STEPS)[number];

/** How far a case has come. */
export interface Progress {
	/** items copied into the case, and how many of them are kept */
	items: number;
	kept: number;
	required: number;
	rounds: number;
	/** tags on the cortex now */
	tags: number;
	/** trials of the mapping */
	trials: number;
	positive: number;
	open: number;
	/** the first step that has not been taken; `results` when all have */
	next: StepName;
}

/** Where the case stands and what comes next: items, then a baseline round, then trials, then their results. */
export function progressOf(state: CaseState): Progress {
	const items = caseItems(state);
	const results = tagResults(state);
	const rounds = baselineRounds(state).length;
	const trials = [...state.trials.values()].filter(({ purpose }) => purpose === 'mapping').length;
	const next = trials > 0 ? 'results' : items.length === 0 ? 'prepare' : rounds === 0 ? 'baseline' : 'theatre';
	return {
		items: items.length,
		kept: items.filter(({ kept }) => kept).length,
		required: state.protocol.required.length,
		rounds,
		tags: [...state.tags.values()].filter(({ placed }) => placed).length,
		trials,
		positive: results.filter(({ result }) => result === 'positive').length,
		open: results.filter(({ result }) => result === 'open' || result === 'untested').length,
		next
	};
}
