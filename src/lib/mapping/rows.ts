import type { CaseState, Row, Trial } from './case-state';
import { verdict } from './verdict';
import { CLASSES, type Effect, type ResponseClass } from './vocabulary';

/** Key of a row: tag, task and language, none of which can hold a blank. */
export function rowKey(trial: Pick<Trial, 'tag' | 'task' | 'language'>): string {
	return `${trial.tag} ${trial.task} ${trial.language}`;
}

/** Whether a trial makes a row of a class: stimulated, in the mapping, and about language where language is asked. */
export function makesRow(trial: Trial | null | undefined, asked: ResponseClass): trial is Trial & { tag: string } {
	if (!trial || !trial.stimulated || trial.tag === null || trial.purpose !== 'mapping') return false;
	return asked === 'speech-motor' || trial.item !== null;
}

/**
 * Puts a trial that has changed into the rows it belongs to now.
 *
 * @returns the keys of the rows it left, entered or stayed in; their results are to be worked out again
 */
export function moveTrial(state: CaseState, before: Trial | undefined, after: Trial | null): string[] {
	const keys = new Set<string>();
	for (const asked of CLASSES) {
		const from = makesRow(before, asked) ? rowKey(before) : null;
		const to = makesRow(after, asked) ? rowKey(after) : null;
		if (from !== null) keys.add(from);
		if (to !== null) keys.add(to);
		if (before && from !== null && from !== to) leave(state.rows[asked], from, before.id);
		if (makesRow(after, asked) && to !== null && from !== to) enter(state, asked, to, after);
	}
	return [...keys];
}

function leave(rows: Map<string, Row>, key: string, id: string): void {
	const row = rows.get(key);
	if (!row) return;
	row.trials = row.trials.filter((other) => other !== id);
	if (row.trials.length === 0) rows.delete(key);
}

function enter(state: CaseState, asked: ResponseClass, key: string, trial: Trial & { tag: string }): void {
	const rows = state.rows[asked];
	const row = rows.get(key) ?? emptyRow(trial, state);
	rows.set(key, row);
	row.trials.push(trial.id);
}

function emptyRow(trial: Trial & { tag: string }, state: CaseState): Row {
	const { tag, task, language } = trial;
	return { tag, task, language, ...verdict([], state.protocol.rule), kinds: {}, milliamps: null, trials: [] };
}

/** Puts the trials of one row in log order and works out its result from its trials and the rule in force. */
export function judgeRow(state: CaseState, asked: ResponseClass, key: string): void {
	const row = state.rows[asked].get(key);
	if (!row) return;
	const trials = row.trials.map((id) => state.trials.get(id)).filter((trial) => trial !== undefined);
	if (!inOrder(trials)) row.trials = trials.sort((a, b) => a.order - b.order).map((trial) => trial.id);
	const effects: Effect[] = [];
	const kinds: Row['kinds'] = {};
	let milliamps: Row['milliamps'] = null;
	for (const trial of trials) {
		const effect = trial.effect[asked];
		if (effect === 'pending') continue;
		effects.push(effect);
		if (effect === 'excluded') continue;
		milliamps = widen(milliamps, trial.milliamps);
		count(kinds, trial);
	}
	Object.assign(row, verdict(effects, state.protocol.rule), { kinds, milliamps });
}

function inOrder(trials: readonly Trial[]): boolean {
	return trials.every((trial, index) => index === 0 || (trials[index - 1] as Trial).order < trial.order);
}

function count(kinds: Row['kinds'], { score }: Trial): void {
	if (!score) return;
	for (const kind of new Set([score.score, ...(score.also ?? [])])) {
		if (kind !== 'intact') kinds[kind] = (kinds[kind] ?? 0) + 1;
	}
}

function widen(range: [number, number] | null, value: number | null): [number, number] | null {
	if (value === null) return range;
	return range ? [Math.min(range[0], value), Math.max(range[1], value)] : [value, value];
}
