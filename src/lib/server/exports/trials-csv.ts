import { caseItems } from '../../mapping/case-items';
import {
	dataOf,
	standing,
	trialsInOrder,
	type CaseState,
	type ExclusionReason,
	type Trial
} from '../../mapping/case-state';
import type { EventData } from '../../mapping/events';
import { writeCsv, type Cell } from './csv';
import { protocolCells } from './protocol-columns';
import { TRIAL_COLUMNS, type TrialColumn } from './trial-columns';
import { zonedTime } from './zoned-time';

/**
 * Every trial of a case, whatever its purpose, in log order: what was done, what was said of it, what it counts for
 * under the protocol in force, and that protocol.
 *
 * @param zone the clinic's time zone, in which all times are written
 */
export function trialsCsv(code: string, state: CaseState, zone: string): string {
	const answers = answersOf(state);
	const protocol = protocolCells(state.protocol);
	const rows = trialsInOrder(state).map((trial): Record<TrialColumn, Cell> => ({
		case: code,
		...presentation(state, trial, zone),
		answer: answers.get(itemKey(trial.item, trial)) ?? null,
		...settings(state, trial),
		...score(state, trial, zone),
		...onset(state, trial, zone),
		excluded: trial.excluded.map(reasonText).join('; '),
		effect_language: trial.effect.language,
		effect_speech_motor: trial.effect['speech-motor'],
		...protocol
	}));
	return writeCsv(TRIAL_COLUMNS, rows);
}

function itemKey(item: string | null, { task, language }: { task: string; language: string }): string {
	return JSON.stringify([item, task, language]);
}

function answersOf(state: CaseState): Map<string, string> {
	return new Map(caseItems(state).map((item) => [itemKey(item.id, item), item.answer]));
}

function presentation(state: CaseState, trial: Trial, zone: string) {
	return {
		position: state.entries.get(trial.entry)?.event.position ?? null,
		trial: trial.id,
		at: zonedTime(trial.at, zone),
		device: trial.device,
		by: trial.by,
		run: trial.run,
		purpose: trial.purpose,
		tag: trial.tag,
		stimulated: trial.stimulated,
		milliamps: trial.milliamps,
		task: trial.task,
		language: trial.language,
		item: trial.item
	};
}

/** The stimulation settings that held when the trial was presented; those of another technique than its own do not. */
function settings(state: CaseState, trial: Trial) {
	const held = standing(state.history.settings)
		.filter(({ order }) => order < trial.order)
		.map((entry): Partial<EventData['stimulation-settings']> => dataOf(entry, 'stimulation-settings'))
		.findLast(({ technique }) => trial.technique === null || technique === trial.technique);
	return {
		technique: trial.technique ?? held?.technique ?? null,
		frequency_hz: held?.frequency ?? null,
		pulse_width_ms: held?.pulseWidth ?? null,
		probe: held?.probe ?? null,
		train_s: held?.train ?? null
	};
}

function score(state: CaseState, trial: Trial, zone: string) {
	const entries = trial.standing.map((id) => state.entries.get(id)).filter((entry) => entry !== undefined);
	const [holding] = trial.contested ? [] : entries;
	const scored: Partial<EventData['trial-scored']> = trial.score ?? {};
	return {
		score: scored.score ?? null,
		also: scored.also?.join(' ') ?? null,
		when: scored.when ?? null,
		movement_tongue: scored.movement?.tongue ?? null,
		movement_hand: scored.movement?.hand ?? null,
		said: scored.said ?? null,
		note: scored.note ?? null,
		scored_at: holding ? zonedTime(holding.event.at, zone) : null,
		scored_by: holding?.event.by ?? holding?.event.sender ?? null,
		contested: trial.contested,
		contested_scores: trial.contested ? entries.map((entry) => dataOf(entry, 'trial-scored').score).join(' ') : null,
		pending: trial.effect.language === 'pending'
	};
}

/** What the patient's device said last. */
function onset(state: CaseState, trial: Trial, zone: string) {
	const last = standing(state.records.get(trial.id)?.onsets ?? []).at(-1);
	const said: Partial<EventData['trial-onset']> = last ? dataOf(last, 'trial-onset') : {};
	return {
		shown: trial.shown,
		onset_planned: said.planned === undefined ? null : zonedTime(said.planned, zone),
		onset_measured: said.measured === undefined ? null : zonedTime(said.measured, zone),
		onset_source: said.source ?? null
	};
}

function reasonText({ why, detail }: ExclusionReason): string {
	return detail === null ? why : `${why}: ${detail}`;
}
