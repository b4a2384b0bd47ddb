import { caseItems } from '$lib/mapping/case-items';
import { standing, type CaseState } from '$lib/mapping/case-state';

/** An item set as the case has it. */
export interface CopiedSet {
	set: string;
	/** the version copied last */
	version: string;
	task: string;
	language: string;
	kept: number;
	dropped: number;
	/** ids of the entries that copied it */
	entries: string[];
}

/** The item sets the case has items of, in the order they were copied first. */
export function copiedSets(state: CaseState): CopiedSet[] {
	const sets = new Map<string, CopiedSet>();
	for (const { event } of standing(state.history.items)) {
		if (event.type !== 'items-copied') continue;
		const { set, version, task, language } = event.data;
		const key = `${set} ${task} ${language}`;
		const known = sets.get(key) ?? { set, version, task, language, kept: 0, dropped: 0, entries: [] };
		sets.set(key, { ...known, version, entries: [...known.entries, event.id] });
	}
	for (const { set, task, language, kept } of caseItems(state)) {
		const known = sets.get(`${set} ${task} ${language}`);
		if (!known) continue;
		if (kept) known.kept++;
		else known.dropped++;
	}
	return [...sets.values()];
}
