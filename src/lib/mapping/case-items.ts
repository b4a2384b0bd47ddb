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

/** Every item copied into the case, in the order it was copied; a later copy of an item replaces the earlier one. */
export function caseItems(state: CaseState): KeptItem[] {
	const items = new Map<string, KeptItem>();
	for (const entry of standing(state.history.items)) {
		if (entry.event.type === 'items-copied') {
			const { set, version, task, language, leadIn, items: copied } = dataOf(entry, 'items-copied');
			for (const item of copied) {
				const key = itemKey({ id: item.id, task, language });
				const { kept = true, reason = null } = items.get(key) ?? {};
				items.set(key, { ...item, task, language, set, version, leadIn, kept, reason });
			}
			continue;
		}
		const { item, task, language, keep, reason } = dataOf(entry, 'item-decided');
		const known = items.get(itemKey({ id: item, task, language }));
		if (known) Object.assign(known, { kept: keep, reason: reason ?? null });
	}
	return [...items.values()];
}

/** The tasks and languages the case has items for, in the order they were copied. */
export function preparedTasks(items: readonly KeptItem[]): TaskLanguage[] {
	const seen = new Map<string, TaskLanguage>();
	for (const { task, language } of items) seen.set(`${task} ${language}`, { task, language });
	return [...seen.values()];
}
