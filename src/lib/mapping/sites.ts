import { standing, type CaseState, type Row } from './case-state';
import { combined, stillOpen, type CombinedRow } from './combined';
import type { TaskLanguage } from './events';
import type { Verdict } from './verdict';
import { CLASSES, type ResponseClass, type TagKind } from './vocabulary';

/** One row as the map shows it and outside programs read it. */
export type SiteRow = Omit<Row, 'trials'>;

/** The combined result of one tag. */
export interface TagResult {
	tag: string;
	kind: TagKind;
	result: Verdict;
	/** the classes that are positive there */
	positive: ResponseClass[];
	/** what an open tag still needs */
	open: TaskLanguage[];
}

/** Tags in the order a person counts: 2 before 10, 7 before 7B, letters last. */
export function compareTags(a: string, b: string): number {
	const [numberA, numberB] = [leadingNumber(a), leadingNumber(b)];
	if (numberA !== numberB) return numberA - numberB;
	return a < b ? -1 : a > b ? 1 : 0;
}

function leadingNumber(tag: string): number {
	const digits = /^\d+/.exec(tag);
	return digits ? Number(digits[0]) : Infinity;
}

/** One row a tag, task and language that was stimulated, in the order of the tags. */
export function sites(state: CaseState, asked: ResponseClass = 'language'): Row[] {
	return [...state.rows[asked].values()].sort(
		(a, b) => compareTags(a.tag, b.tag) || compareText(a.task, b.task) || compareText(a.language, b.language)
	);
}

function compareText(a: string, b: string): number {
	return a < b ? -1 : a > b ? 1 : 0;
}

/** The combined result of every tag that is laid or was tested. */
export function tagResults(state: CaseState): TagResult[] {
	const rows = new Map<string, CombinedRow[]>();
	for (const { tag, placed } of state.tags.values()) if (placed) rows.set(tag, []);
	for (const asked of CLASSES) {
		for (const row of sites(state, asked)) {
			const list = rows.get(row.tag) ?? [];
			rows.set(row.tag, list);
			list.push({ task: row.task, language: row.language, verdict: row.verdict, class: asked });
		}
	}
	return [...rows].map(([tag, list]) => tagResult(state, tag, list)).sort((a, b) => compareTags(a.tag, b.tag));
}

function tagResult(state: CaseState, tag: string, rows: CombinedRow[]): TagResult {
	const { required } = state.protocol;
	return {
		tag,
		kind: state.tags.get(tag)?.kind ?? 'cortical',
		result: combined(rows, required),
		positive: CLASSES.filter((asked) => rows.some((row) => row.class === asked && row.verdict === 'positive')),
		open: stillOpen(rows, required)
	};
}

/** Ids of entries that present a trial which an earlier standing entry presented already: kept, without effect. */
export function repeatedPresentations(state: CaseState): string[] {
	return [...state.records.values()].flatMap((record) =>
		standing(record.presented)
			.slice(1)
			.map((entry) => entry.event.id)
	);
}
