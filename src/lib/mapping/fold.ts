import { dataOf, emptyCase, standing, type CaseState, type Entry, type TrialRecord } from './case-state';
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
	/** every trial: the protocol or a pause has changed */
	all = false;
}

function add(state: CaseState, event: LogEvent, dirty: Dirty): void {
	if (event.position !== undefined && event.position > state.position) state.position = event.position;
	const known = state.entries.get(event.id);
	if (known) {
		if (known.event.position === undefined && event.position !== undefined) {
			known.event = event;
			update(state, known, dirty);
		}
		return;
	}
	const entry: Entry = { event, order: state.entries.size, withdrawn: false, withdrawnBy: [] };
	state.entries.set(event.id, entry);
	if (!isKnown(event)) {
		state.unknown.push({ id: event.id, type: event.type, version: event.v ?? 1 });
		return;
	}
	file(state, entry, dirty);
	update(state, entry, dirty);
}

const TYPES: ReadonlySet<string> = new Set(EVENT_TYPES);
const KNOWN_SCORES: ReadonlySet<string> = new Set(SCORES);

function isKnown(event: LogEvent): boolean {
	if (!TYPES.has(event.type) || (event.v ?? 1) !== 1) return false;
	if (event.type !== 'trial-scored') return true;
	return [event.data.score, ...(event.data.also ?? [])].every((score) => KNOWN_SCORES.has(score));
}

/** Puts an entry beside the others on its subject. */
function file(state: CaseState, entry: Entry, dirty: Dirty): void {
	const { event } = entry;
	switch (event.type) {
		case 'trial-presented': {
			recordOf(state, event.data.trial).presented.push(entry);
			if (event.data.run !== undefined) setOf(state.trialsOfRun, event.data.run).add(event.data.trial);
			return;
		}
		case 'trial-corrected':
			recordOf(state, event.data.trial).corrected.push(entry);
			return;
		case 'trial-onset':
			recordOf(state, event.data.trial).onsets.push(entry);
			return;
		case 'trial-scored':
			recordOf(state, event.data.trial).scores.push(entry);
			for (const replaced of event.data.corrects) listOf(state.replacements, replaced).push(entry);
			return;
		case 'trial-excluded':
			recordOf(state, event.data.trial).exclusions.push(entry);
			return;
		case 'stimulation-started':
			if (event.data.trial !== undefined) recordOf(state, event.data.trial).stimulations.push(entry);
			return;
		case 'entry-withdrawn':
			withdraw(state, entry, dirty);
			return;
		case 'tag-placed':
		case 'tag-removed':
			listOf(state.history.tags, event.data.tag).push(entry);
			return;
		case 'run-opened':
		case 'run-closed':
			listOf(state.history.runs, event.data.run).push(entry);
			return;
		case 'pause-opened':
		case 'pause-closed':
			listOf(state.history.pauses, event.data.pause).push(entry);
			return;
		case 'protocol-set':
			state.history.protocol.push(entry);
			return;
		case 'stimulation-settings':
			state.history.settings.push(entry);
			return;
		case 'items-copied':
		case 'item-decided':
			state.history.items.push(entry);
			return;
		case 'stimulation-ended':
			return;
	}
}

/** Takes back an entry before it in the log; one that comes later, or never, is not touched. */
function withdraw(state: CaseState, withdrawal: Entry, dirty: Dirty): void {
	const target = state.entries.get(dataOf(withdrawal, 'entry-withdrawn').entry);
	if (!target || target === withdrawal) return;
	target.withdrawnBy.push(withdrawal);
	restand(state, target, dirty);
}

/**
 * Works out whether an entry stands after one that names it has come or gone, and follows a chain of withdrawals of
 * withdrawals down to what it is about. Withdrawals name earlier entries only, so the chain ends.
 */
function restand(state: CaseState, first: Entry, dirty: Dirty): void {
	let entry: Entry | undefined = first;
	while (entry) {
		const withdrawn: boolean = entry.withdrawnBy.some((other) => !other.withdrawn);
		if (withdrawn === entry.withdrawn) return;
		entry.withdrawn = withdrawn;
		update(state, entry, dirty);
		entry = entry.event.type === 'entry-withdrawn' ? state.entries.get(entry.event.data.entry) : undefined;
	}
}

/** Brings up to date what an entry that has come, gone or come back is about. */
function update(state: CaseState, entry: Entry, dirty: Dirty): void {
	const { event } = entry;
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
			updatePause(state, event.data.pause);
			dirty.all = true;
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

/** Works out again every trial that was touched, then every row that one of them is or was in. */
function settle(state: CaseState, dirty: Dirty): void {
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
