import { trialsInOrder, type CaseState, type Trial } from './case-state';
import type { TaskLanguage } from './events';
import type { ResponseClass } from './vocabulary';

/** How often the patient errs without stimulation. */
export interface ControlRate extends TaskLanguage {
	disturbed: number;
	valid: number;
}

/** Errors without stimulation in the mapping, for each task and language, in the order they were first seen. */
export function controlRates(state: CaseState, asked: ResponseClass = 'language'): ControlRate[] {
	const rates = new Map<string, ControlRate>();
	for (const trial of trialsInOrder(state)) {
		if (!isControl(trial, asked)) continue;
		const effect = trial.effect[asked];
		if (effect !== 'disturbed' && effect !== 'intact') continue;
		const key = `${trial.task} ${trial.language}`;
		const rate = rates.get(key) ?? { task: trial.task, language: trial.language, disturbed: 0, valid: 0 };
		rates.set(key, rate);
		rate.valid++;
		if (effect === 'disturbed') rate.disturbed++;
	}
	return [...rates.values()];
}

/**
 * A trial of the mapping without stimulation, at a tag or at none. One without an item (a movement, a sensation) says
 * nothing of language, as in the rows.
 */
export function isControl(trial: Trial, asked: ResponseClass = 'language'): boolean {
	return !trial.stimulated && trial.purpose === 'mapping' && (asked === 'speech-motor' || trial.item !== null);
}
