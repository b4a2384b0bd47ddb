import { dataOf, standing, type CaseState } from './case-state';
import type { CaseItem, TaskLanguage } from './events';

/** An item of the case with what the therapist decided. */
export interface KeptItem extends CaseItem, TaskLanguage {
	set: string;
	version: string;
	leadIn: string | null;
	kept: boolean;
	/** why it was dropped, where somebody said so */
	reason: string | null;
}

function itemKey({ id, task, language }: TaskLanguage & { id: string }): string {
	return `${id} ${task} ${language}`;
}

/**
 * Every item copied into the case, in the order it was copied; a later copy of an item replaces the earlier one. The last
 * decision on an item holds, were it made before the item was copied or copied again.
 */
export function caseItems(state: CaseState): KeptItem[] {
	const copies = new Map<string, Omit<KeptItem, 'kept' | 'reason'>>();
	const decisions = new Map<string, Pick<KeptItem, 'kept' | 'reason'>>();
	for (const entry of standing(state.history.items)) {
		if (entry.event.type === 'items-copied') {
			const { set, version, task, language, leadIn, items } = dataOf(entry, 'items-copied');
			for (const item of items) {
				copies.set(itemKey({ id: item.id, task, language }), { ...item, task, language, set, version, leadIn });
			}
		} else {
			const { item, task, language, keep, reason } = dataOf(entry, 'item-decided');
			decisions.set(itemKey({ id: item, task, language }), { kept: keep, reason: reason ?? null });
		}
	}
	const undecided = { kept: true, reason: null };
	return [...copies].map(([key, copy]) => ({ ...copy, ...(decisions.get(key) ?? undecided) }));
}

/** The tasks and languages the case has items for, in the order they were copied. */
export function preparedTasks(items: readonly KeptItem[]): TaskLanguage[] {
	const seen = new Map<string, TaskLanguage>();
	for (const { task, language } of items) seen.set(`${task} ${language}`, { task, language });
	return [...seen.values()];
}
