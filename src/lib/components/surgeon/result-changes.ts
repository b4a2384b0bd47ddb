import type { CaseState } from '$lib/mapping/case-state';
import type { LogEvent, TaskLanguage } from '$lib/mapping/events';
import { fold } from '$lib/mapping/fold';
import { compareTags, tagResults } from '$lib/mapping/sites';
import type { Verdict } from '$lib/mapping/verdict';
import { CLASSES, type ResponseClass } from '$lib/mapping/vocabulary';

/** Everything that is positive at one moment: whole tags, and single results. */
export interface Positives {
	tags: Set<string>;
	rows: Map<string, TaskLanguage & { tag: string; class: ResponseClass }>;
}

/** A result that was positive and is not any more. */
export interface ChangeAway {
	tag: string;
	/** what the tag, or the one result, is now */
	to: Verdict;
	/** the one result that changed, where the tag as a whole stays positive; else null */
	of: (TaskLanguage & { class: ResponseClass }) | null;
}

export function positives(state: CaseState): Positives {
	const tags = tagResults(state).filter(({ result }) => result === 'positive');
	const rows: Positives['rows'] = new Map();
	for (const asked of CLASSES) {
		for (const [key, { tag, task, language, verdict }] of state.rows[asked]) {
			if (verdict === 'positive') rows.set(`${asked} ${key}`, { tag, task, language, class: asked });
		}
	}
	return { tags: new Set(tags.map(({ tag }) => tag)), rows };
}

/** What has changed away from positive since `before`, in the order of the tags. */
export function changesAway(before: Positives, state: CaseState): ChangeAway[] {
	const now = new Map(tagResults(state).map(({ tag, result }) => [tag, result]));
	const changed: ChangeAway[] = [];
	for (const tag of before.tags) {
		const to = now.get(tag) ?? 'untested';
		if (to !== 'positive') changed.push({ tag, to, of: null });
	}
	const told = new Set(changed.map(({ tag }) => tag));
	for (const [key, { tag, task, language, class: asked }] of before.rows) {
		if (told.has(tag)) continue;
		const to = state.rows[asked].get(key.slice(asked.length + 1))?.verdict ?? 'untested';
		if (to !== 'positive') changed.push({ tag, to, of: { task, language, class: asked } });
	}
	return changed.sort((a, b) => compareTags(a.tag, b.tag));
}

/** The last news of results that changed away from positive. */
export interface News {
	changes: ChangeAway[];
	/** server time of the entry that changed them, milliseconds since the epoch */
	at: number;
}

/** How long news stays on the screen. */
export const NEWS_LASTS = 5 * 60_000;

/** When the server had an entry; one that still waits on its device counts from when it was made. */
export function timeOf(event: LogEvent): number {
	return Date.parse(event.receivedAt ?? event.at);
}

/**
 * The news that a screen opened now has missed: what the entries of the last five minutes took away.
 *
 * @param now server time in milliseconds since the epoch
 */
export function recentNews(log: readonly LogEvent[], now: number): News | null {
	const first = log.findIndex((event) => timeOf(event) > now - NEWS_LASTS);
	if (first === -1) return null;
	let state = fold(log.slice(0, first));
	let news: News | null = null;
	for (const event of log.slice(first)) {
		const before = positives(state);
		state = fold([event], state);
		const changes = changesAway(before, state);
		if (changes.length > 0) news = { changes, at: timeOf(event) };
	}
	return news;
}
