import {
	dataOf,
	emptyCase,
	isDuring,
	standing,
	type CaseState,
	type Entry,
	type Pause,
	type TrialRecord
} from './case-state';
import { deriveTrial } from './derive-trial';
import { EVENT_TYPES, type LogEvent } from './events';
import { amend, DEFAULT_PROTOCOL } from './protocol';
import { judgeRow, moveTrial } from './rows';
import { CLASSES, SCORES } from './vocabulary';

/**
 * The case as its log has it: a pure function from entries to state, the same wherever it runs.
 * `fold(a ++ b)` equals `fold(b, fold(a))` for every cut.
 *
 * @param events entries in log order; one whose id is known already is the same entry again and changes nothing,
 *   unless it brings the receipt of an entry that was folded while it still waited on its device
 * @param from the case so far; it is changed and returned, and its giver may not use it any more
 */
export function fold(events: readonly LogEvent[], from: CaseState = emptyCase()): CaseState {
	const dirty = new Dirty();
	for (const event of events) add(from, event, dirty);
	settle(from, dirty);
	return from;
}

/** What has to be worked out again once all entries of a call are in. */
class Dirty {
	readonly trials = new Set<string>();
	/** every trial: the protocol has changed */
	all = false;
	/** the entries this program does not know */
	unknown = false;
}

/** Entries that wait on their device come after every position a log can reach. */
const FIRST_WAITING = 2 ** 40;

function add(state: CaseState, event: LogEvent, dirty: Dirty): void {
	if (event.position !== undefined && event.position > state.position) state.position = event.position;
	const known = state.entries.get(event.id);
	if (known) {
		if (known.event.position === undefined && event.position !== undefined) receive(state, known, event, dirty);
		return;
	}
	const order = event.position ?? (state.waiting.at(-1)?.order ?? FIRST_WAITING - 1) + 1;
	const entry: Entry = { event, order, withdrawn: false };
	state.entries.set(event.id, entry);
	if (event.position === undefined) state.waiting.push(entry);
	take(state, entry, dirty);
}

/** The log has an entry that was folded while it waited: from now on it stands where its position says. */
function receive(state: CaseState, entry: Entry, event: LogEvent, dirty: Dirty): void {
	remove(state.waiting, entry);
	for (const list of placesOf(state, entry)) remove(list, entry);
	entry.event = event;
	entry.order = event.position ?? entry.order;
	take(state, entry, dirty);
}

/** Puts an entry in its place among the others and brings up to date whatever depends on it. */
function take(state: CaseState, entry: Entry, dirty: Dirty): void {
	for (const list of placesOf(state, entry)) insert(list, entry);
	restand(state, entry, dirty);
	restand(state, withdrawnBy(state, entry), dirty);
	update(state, entry, dirty);
}

const TYPES: ReadonlySet<string> = new Set(EVENT_TYPES);
const KNOWN_SCORES: ReadonlySet<string> = new Set(SCORES);

function isKnown(event: LogEvent): boolean {
	if (!TYPES.has(event.type) || (event.v ?? 1) !== 1) return false;
	if (event.type !== 'trial-scored') return true;
	const { score, also } = event.data;
	return KNOWN_SCORES.has(score) && (also === undefined || also.every((other) => KNOWN_SCORES.has(other)));
}

/** The lists, each in log order, that hold an entry beside the others on its subject. */
function placesOf(state: CaseState, { event }: Entry): Entry[][] {
	if (!isKnown(event)) return [state.history.unknown];
	switch (event.type) {
		case 'trial-presented':
			if (event.data.run !== undefined) setOf(state.trialsOfRun, event.data.run).add(event.data.trial);
			return [recordOf(state, event.data.trial).presented];
		case 'trial-corrected':
			return [recordOf(state, event.data.trial).corrected];
		case 'trial-onset':
			return [recordOf(state, event.data.trial).onsets];
		case 'trial-scored':
			return [
				recordOf(state, event.data.trial).scores,
				...event.data.corrects.map((replaced) => listOf(state.replacements, replaced))
			];
		case 'trial-excluded':
			return [recordOf(state, event.data.trial).exclusions];
		case 'stimulation-started':
			return event.data.trial === undefined ? [] : [recordOf(state, event.data.trial).stimulations];
		case 'entry-withdrawn':
			return [listOf(state.withdrawals, event.data.entry)];
		case 'tag-placed':
		case 'tag-removed':
			return [listOf(state.history.tags, event.data.tag)];
		case 'run-opened':
		case 'run-closed':
			return [listOf(state.history.runs, event.data.run)];
		case 'pause-opened':
		case 'pause-closed':
			return [listOf(state.history.pauses, event.data.pause)];
		case 'protocol-set':
			return [state.history.protocol];
		case 'stimulation-settings':
			return [state.history.settings];
		case 'items-copied':
		case 'item-decided':
			return [state.history.items];
		case 'stimulation-ended':
			return [];
	}
}

function insert(list: Entry[], entry: Entry): void {
	let place = list.length;
	while (place > 0 && (list[place - 1] as Entry).order > entry.order) place--;
	if (place === list.length) list.push(entry);
	else list.splice(place, 0, entry);
}

function remove(list: Entry[], entry: Entry): void {
	const place = list.indexOf(entry);
	if (place !== -1) list.splice(place, 1);
}

/** The entry that a withdrawal names, wherever it stands. */
function withdrawnBy(state: CaseState, { event }: Entry): Entry | undefined {
	return event.type === 'entry-withdrawn' && isKnown(event) ? state.entries.get(event.data.entry) : undefined;
}

/**
 * Works out whether an entry stands after one that names it has come, gone or moved, and follows a chain of withdrawals
 * of withdrawals down to what it is about. A withdrawal acts on entries before it only, so the chain ends.
 */
function restand(state: CaseState, first: Entry | undefined, dirty: Dirty): void {
	let entry = first;
	while (entry) {
		const withdrawn = isWithdrawn(state, entry);
		if (withdrawn === entry.withdrawn) return;
		entry.withdrawn = withdrawn;
		update(state, entry, dirty);
		entry = withdrawnBy(state, entry);
	}
}

function isWithdrawn(state: CaseState, entry: Entry): boolean {
	const by = state.withdrawals.get(entry.event.id);
	return by !== undefined && by.some((other) => !other.withdrawn && other.order > entry.order);
}

/** Brings up to date what an entry that has come, gone or come back is about. */
function update(state: CaseState, entry: Entry, dirty: Dirty): void {
	const { event } = entry;
	if (!isKnown(event)) {
		dirty.unknown = true;
		return;
	}
	switch (event.type) {
		case 'trial-presented':
		case 'trial-corrected':
		case 'trial-onset':
		case 'trial-excluded':
			dirty.trials.add(event.data.trial);
			return;
		case 'trial-scored':
			dirty.trials.add(event.data.trial);
			for (const id of event.data.corrects) {
				const replaced = state.entries.get(id);
				if (replaced?.event.type === 'trial-scored') dirty.trials.add(replaced.event.data.trial);
			}
			return;
		case 'stimulation-started':
			if (event.data.trial !== undefined) dirty.trials.add(event.data.trial);
			return;
		case 'tag-placed':
		case 'tag-removed':
			updateTag(state, event.data.tag);
			return;
		case 'run-opened':
		case 'run-closed':
			updateRun(state, event.data.run);
			for (const trial of state.trialsOfRun.get(event.data.run) ?? []) dirty.trials.add(trial);
			return;
		case 'pause-opened':
		case 'pause-closed':
			touchDuring(state, state.pauses.get(event.data.pause), dirty);
			updatePause(state, event.data.pause);
			touchDuring(state, state.pauses.get(event.data.pause), dirty);
			return;
		case 'protocol-set':
			state.protocol = standing(state.history.protocol).reduce(
				(protocol, change) => amend(protocol, dataOf(change, 'protocol-set')),
				DEFAULT_PROTOCOL
			);
			dirty.all = true;
			return;
	}
}

function updateTag(state: CaseState, tag: string): void {
	const entries = standing(state.history.tags.get(tag) ?? []);
	const placed = entries.findLast((entry) => entry.event.type === 'tag-placed');
	if (!placed) {
		state.tags.delete(tag);
		return;
	}
	state.tags.set(tag, {
		tag,
		kind: dataOf(placed, 'tag-placed').kind ?? 'cortical',
		placed: entries.at(-1) === placed
	});
}

function updateRun(state: CaseState, run: string): void {
	const entries = standing(state.history.runs.get(run) ?? []);
	const opened = entries.findLast((entry) => entry.event.type === 'run-opened');
	if (!opened) {
		state.runs.delete(run);
		return;
	}
	const { purpose, lead } = dataOf(opened, 'run-opened');
	state.runs.set(run, { run, purpose, lead: lead ?? null, open: entries.at(-1) === opened });
}

function updatePause(state: CaseState, pause: string): void {
	const entries = standing(state.history.pauses.get(pause) ?? []);
	const opened = entries.find((entry) => entry.event.type === 'pause-opened');
	const closed = entries.find((entry) => entry.event.type === 'pause-closed');
	if (!opened) {
		state.pauses.delete(pause);
		return;
	}
	state.pauses.set(pause, {
		pause,
		reason: dataOf(opened, 'pause-opened').reason,
		from: Date.parse(opened.event.at),
		to: closed ? Date.parse(closed.event.at) : Infinity
	});
}

/** A pause that has come, gone or changed touches the trials that were presented during it. */
function touchDuring(state: CaseState, pause: Pause | undefined, dirty: Dirty): void {
	if (!pause) return;
	for (const trial of state.trials.values()) if (isDuring(pause, Date.parse(trial.at))) dirty.trials.add(trial.id);
}

/** Works out again every trial that was touched, then every row that one of them is or was in. */
function settle(state: CaseState, dirty: Dirty): void {
	if (dirty.unknown) {
		state.unknown = standing(state.history.unknown).map(({ event: { id, type, v = 1 } }) => ({ id, type, version: v }));
	}
	const rows = new Set<string>();
	for (const id of dirty.all ? state.records.keys() : dirty.trials) {
		const before = state.trials.get(id);
		const after = deriveTrial(state, id);
		if (after) state.trials.set(id, after);
		else state.trials.delete(id);
		for (const key of moveTrial(state, before, after)) rows.add(key);
	}
	for (const asked of CLASSES) {
		for (const key of dirty.all ? state.rows[asked].keys() : rows) judgeRow(state, asked, key);
	}
}

function recordOf(state: CaseState, trial: string): TrialRecord {
	let record = state.records.get(trial);
	if (!record) {
		record = { presented: [], corrected: [], onsets: [], scores: [], exclusions: [], stimulations: [] };
		state.records.set(trial, record);
	}
	return record;
}

function listOf(map: Map<string, Entry[]>, key: string): Entry[] {
	let list = map.get(key);
	if (!list) map.set(key, (list = []));
	return list;
}

function setOf(map: Map<string, Set<string>>, key: string): Set<string> {
	let set = map.get(key);
	if (!set) map.set(key, (set = new Set()));
	return set;
}
