import type { EventData, LogEvent } from './events';
import { DEFAULT_PROTOCOL, type Protocol } from './protocol';
import type { SiteVerdict } from './verdict';
import type { Effect, Purpose, ResponseClass, Score, TagKind } from './vocabulary';

/** One event in the log, with what later entries did to it. */
export interface Entry {
	event: LogEvent;
	/** its position; for an entry that still waits on its device, a number after every position, in the order of making */
	order: number;
	withdrawn: boolean;
}

/** Every entry that speaks of one trial, in log order, whatever has become of it. */
export interface TrialRecord {
	presented: Entry[];
	corrected: Entry[];
	onsets: Entry[];
	scores: Entry[];
	exclusions: Entry[];
	stimulations: Entry[];
}

export type ExclusionReason =
	| { why: 'not-shown'; detail: string | null }
	| { why: 'excluded'; detail: string }
	| { why: 'pause'; detail: string }
	| { why: 'other-tag'; detail: string };

/** A trial as the log has it now: corrections applied, withdrawn entries left out. */
export interface Trial {
	id: string;
	/** id of the entry that presented it */
	entry: string;
	/** place of that entry in the log, as in `Entry` */
	order: number;
	at: string;
	device: string;
	by: string | null;
	item: string | null;
	task: string;
	language: string;
	tag: string | null;
	stimulated: boolean;
	milliamps: number | null;
	technique: string | null;
	run: string | null;
	/** null while the run it names was not opened */
	purpose: Purpose | null;
	/** the score that holds; null while there is none or while it is contested */
	score: EventData['trial-scored'] | null;
	/** ids of the scores that stand: none, one, or several when contested */
	standing: string[];
	contested: boolean;
	/** what the patient's device said: true, false, or null when it said nothing yet */
	shown: boolean | null;
	/** why the trial does not count whatever its score */
	excluded: ExclusionReason[];
	effect: Record<ResponseClass, Effect | 'pending'>;
}

/** One result: a tag, a task and a language, for one class. */
export interface Row extends SiteVerdict {
	tag: string;
	task: string;
	language: string;
	/** scores of the valid trials, intact left out */
	kinds: Partial<Record<Score, number>>;
	/** lowest and highest current of the valid trials, zero to peak */
	milliamps: [number, number] | null;
	/** the row's trials in log order */
	trials: string[];
}

export interface Tag {
	tag: string;
	kind: TagKind;
	/** laid on the cortex now */
	placed: boolean;
}

export interface Run {
	run: string;
	purpose: Purpose;
	lead: string | null;
	open: boolean;
}

/**
 * The case as it stands. `fold` alone makes and changes it; everything else reads. It holds no function and no
 * cache, so that two folds of one log are deeply equal.
 */
export interface CaseState {
	/** highest position folded; 0 for none */
	position: number;
	entries: Map<string, Entry>;
	/** entries folded before the log had them, in the order they were made */
	waiting: Entry[];
	/** withdrawals, by the id of the entry they name */
	withdrawals: Map<string, Entry[]>;
	/** entries that name a score as replaced, by the id of that score */
	replacements: Map<string, Entry[]>;
	records: Map<string, TrialRecord>;
	trials: Map<string, Trial>;
	trialsOfRun: Map<string, Set<string>>;
	rows: Record<ResponseClass, Map<string, Row>>;
	tags: Map<string, Tag>;
	runs: Map<string, Run>;
	pauses: Map<string, Pause>;
	protocol: Protocol;
	/** history of each subject, in log order */
	history: {
		tags: Map<string, Entry[]>;
		runs: Map<string, Entry[]>;
		pauses: Map<string, Entry[]>;
		protocol: Entry[];
		settings: Entry[];
		items: Entry[];
		unknown: Entry[];
	};
	/** standing entries of a type or version this program does not know: with any, no result may be shown */
	unknown: { id: string; type: string; version: number }[];
}

export interface Pause {
	pause: string;
	reason: string;
	/** milliseconds since the epoch; a trial presented at `from` or later and before `to` does not count */
	from: number;
	to: number;
}

/** `time` in milliseconds since the epoch */
export function isDuring(pause: Pause, time: number): boolean {
	return pause.from <= time && time < pause.to;
}

export function emptyCase(): CaseState {
	return {
		position: 0,
		entries: new Map(),
		waiting: [],
		withdrawals: new Map(),
		replacements: new Map(),
		records: new Map(),
		trials: new Map(),
		trialsOfRun: new Map(),
		rows: { language: new Map(), 'speech-motor': new Map() },
		tags: new Map(),
		runs: new Map(),
		pauses: new Map(),
		protocol: DEFAULT_PROTOCOL,
		history: {
			tags: new Map(),
			runs: new Map(),
			pauses: new Map(),
			protocol: [],
			settings: [],
			items: [],
			unknown: []
		},
		unknown: []
	};
}

/** The trials of the case in log order, which is not the order in which the map holds them. */
export function trialsInOrder(state: CaseState): Trial[] {
	return [...state.trials.values()].sort((a, b) => a.order - b.order);
}

/** The entries of a list that nothing has taken back. */
export function standing(entries: readonly Entry[]): Entry[] {
	return entries.filter((entry) => !entry.withdrawn);
}

/** `data` of an entry whose type the caller knows by where it found it. */
export function dataOf<T extends keyof EventData>(entry: Entry, type: T): EventData[T] {
	if (entry.event.type !== type) throw new TypeError(`expected ${type}, found ${entry.event.type}`);
	return entry.event.data as EventData[T];
}
