import type { CaseState, Row, Trial } from '$lib/mapping/case-state';
import type { TaskLanguage } from '$lib/mapping/events';
import { rowKey } from '$lib/mapping/rows';
import { sites, tagResults } from '$lib/mapping/sites';
import { taskLanguages } from '$lib/mapping/task-languages';
import { CLASSES, type ResponseClass } from '$lib/mapping/vocabulary';

/** A negative result with a disturbed trial in it, at a tag that is not positive: to be tested again. */
export interface Again extends TaskLanguage {
	tag: string;
	class: ResponseClass;
	disturbed: number;
	valid: number;
}

/** Every negative result with a disturbed trial, task by task and language by language, there in the order of the tags. */
export function toTestAgain(state: CaseState): Again[] {
	const positive = new Set(
		tagResults(state)
			.filter(({ result }) => result === 'positive')
			.map(({ tag }) => tag)
	);
	const pairs = taskLanguages(state);
	const place = (one: TaskLanguage) => pairs.findIndex((pair) => isSame(pair, one));
	return CLASSES.flatMap((asked) =>
		sites(state, asked)
			.filter((row) => row.verdict === 'negative' && row.disturbed > 0 && !positive.has(row.tag))
			.sort((a, b) => place(a) - place(b))
			.map(({ tag, task, language, disturbed, valid }) => ({ tag, task, language, class: asked, disturbed, valid }))
	);
}

/** What one task and language still needs: how many trials, at which tags; fewest to go first. */
export interface ToGo extends TaskLanguage {
	trials: { remaining: number; tags: string[] }[];
	/** tags whose result is open but will be positive whatever comes */
	willBePositive: string[];
}

/** What is still to do before every tag has a result, by task and language, in the order of the case. */
export function toGo(state: CaseState): ToGo[] {
	const results = tagResults(state).filter(({ result }) => result === 'open' || result === 'untested');
	const pairs = taskLanguages(state);
	return pairs.map((pair) => {
		const tags = results
			.filter(({ result, open }) => result === 'untested' || open.some((other) => isSame(other, pair)))
			.map(({ tag }) => tag);
		return { ...pair, ...needs(state, pair, tags) };
	});
}

function isSame(a: TaskLanguage, b: TaskLanguage): boolean {
	return a.task === b.task && a.language === b.language;
}

function needs(state: CaseState, { task, language }: TaskLanguage, tags: string[]): Omit<ToGo, keyof TaskLanguage> {
	const byNumber = new Map<number, string[]>();
	const willBePositive: string[] = [];
	for (const tag of tags) {
		const row: Row | undefined = state.rows.language.get(rowKey({ tag, task, language }));
		const remaining = row?.remaining ?? state.protocol.rule.minTrials;
		byNumber.set(remaining, [...(byNumber.get(remaining) ?? []), tag]);
		if (row?.settled === 'positive') willBePositive.push(tag);
	}
	const trials = [...byNumber].map(([remaining, list]) => ({ remaining, tags: list }));
	return { trials: trials.sort((a, b) => a.remaining - b.remaining), willBePositive };
}

/** Trials of the mapping without a score, and those with two scores that disagree, in log order; excluded ones are not. */
export function withoutScore(state: CaseState): { notScored: Trial[]; contested: Trial[] } {
	const waiting = [...state.trials.values()]
		.filter((trial) => trial.purpose === 'mapping' && trial.excluded.length === 0 && trial.score === null)
		.sort((a, b) => a.order - b.order);
	return {
		notScored: waiting.filter((trial) => !trial.contested),
		contested: waiting.filter((trial) => trial.contested)
	};
}
