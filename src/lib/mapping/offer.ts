import { trialsInOrder, type CaseState } from './case-state';
import type { KeptItem } from './case-items';
import type { TaskLanguage } from './events';

export interface Offer {
	item: KeptItem;
	/** every item of the task was shown at this tag already: this one comes again */
	again: boolean;
}

/**
 * The item to show next: one the patient has not seen at this tag, in whichever language, while such items remain;
 * among those the one shown least often so far, then the first in the order.
 *
 * @param items the kept items of one task and language, in the order they are to come
 * @param at the tag, null for a control without one, or undefined while no tag is chosen
 * @param skipped ids of items to leave out while others remain
 */
export function nextItem(
	state: CaseState,
	items: readonly KeptItem[],
	at: { tag?: string | null } & TaskLanguage,
	skipped: ReadonlySet<string> = new Set()
): Offer | null {
	const shown = new Map<string, number>();
	const seenHere = new Set<string>();
	for (const trial of state.trials.values()) {
		if (trial.item === null || trial.purpose === 'baseline' || trial.shown === false) continue;
		shown.set(trial.item, (shown.get(trial.item) ?? 0) + 1);
		if (at.tag && trial.tag === at.tag) seenHere.add(trial.item);
	}
	const pool = items.filter((item) => item.kept && item.task === at.task && item.language === at.language);
	const fresh = pool.filter((item) => !seenHere.has(item.id));
	const candidates = fresh.length > 0 ? fresh : pool;
	const wanted = candidates.filter((item) => !skipped.has(item.id));
	const [item] = (wanted.length > 0 ? wanted : candidates).toSorted(
		(a, b) => (shown.get(a.id) ?? 0) - (shown.get(b.id) ?? 0)
	);
	return item ? { item, again: fresh.length === 0 } : null;
}

/**
 * The prompt of a running task (counting, free speech): it stays while one stimulation follows the other, and comes
 * back when the task is taken up again; only skipping it brings the next.
 *
 * @param items in the order they were copied
 * @param showing id of the item that stands on the patient view, or null
 */
export function stayingItem(
	state: CaseState,
	items: readonly KeptItem[],
	{ task, language }: TaskLanguage,
	showing: string | null,
	skipped: ReadonlySet<string>
): Offer | null {
	const pool = items.filter((item) => item.kept && item.task === task && item.language === language);
	const wanted = pool.filter((item) => !skipped.has(item.id));
	const candidates = wanted.length > 0 ? wanted : pool;
	const last = trialsInOrder(state).findLast(
		(trial) => trial.task === task && trial.language === language && candidates.some(({ id }) => id === trial.item)
	);
	const item =
		candidates.find(({ id }) => id === showing) ?? candidates.find(({ id }) => id === last?.item) ?? candidates[0];
	return item ? { item, again: false } : null;
}
