import type { CaseState, Row, Trial } from '$lib/mapping/case-state';
import { makesRow, rowKey } from '$lib/mapping/rows';
import type { ResponseClass } from '$lib/mapping/vocabulary';

/** The last trial of a case, with the result it belongs to. */
export interface LastTrial {
	trial: Trial;
	status: 'not-scored' | 'contested' | 'not-counted' | 'scored';
	/** the class it says something of: speech-motor where it disturbed that alone */
	class: ResponseClass;
	/** the row it is in, or null for a control and for a trial outside the mapping */
	row: Row | null;
}

/** The trial presented last, by its place in the log; one taken back never was. Null before the first. */
export function lastTrial(state: CaseState): LastTrial | null {
	let trial: Trial | undefined;
	for (const other of state.trials.values()) if (!trial || other.order > trial.order) trial = other;
	if (!trial) return null;
	const asked = classOf(trial);
	return {
		trial,
		status: statusOf(trial, asked),
		class: asked,
		row: makesRow(trial, asked) ? (state.rows[asked].get(rowKey(trial)) ?? null) : null
	};
}

function classOf(trial: Trial): ResponseClass {
	const motorAlone = trial.effect['speech-motor'] === 'disturbed' && trial.effect.language !== 'disturbed';
	return trial.item === null || motorAlone ? 'speech-motor' : 'language';
}

function statusOf(trial: Trial, asked: ResponseClass): LastTrial['status'] {
	if (trial.effect[asked] === 'excluded') return 'not-counted';
	if (trial.contested) return 'contested';
	return trial.effect[asked] === 'pending' ? 'not-scored' : 'scored';
}
