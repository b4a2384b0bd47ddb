import type { TaskLanguage } from './events';
import type { Verdict } from './verdict';
import type { ResponseClass } from './vocabulary';

/** What the combined result of a site needs of each of its rows; the class is language unless said. */
export interface CombinedRow extends TaskLanguage {
	verdict: Verdict;
	class?: ResponseClass;
}

/**
 * One result for a site out of all its rows: positive when any row is; negative when every task and language that
 * the protocol requires is negative there (with none required: when it has language rows and all are negative);
 * untested without a row; otherwise open.
 */
export function combined(rows: readonly CombinedRow[], required: readonly TaskLanguage[]): Verdict {
	if (rows.length === 0) return 'untested';
	if (rows.some((row) => row.verdict === 'positive')) return 'positive';
	return isNegative(rows, required) ? 'negative' : 'open';
}

function isNegative(rows: readonly CombinedRow[], required: readonly TaskLanguage[]): boolean {
	const language = rows.filter(isLanguage);
	if (required.length === 0) return language.length > 0 && language.every((row) => row.verdict === 'negative');
	return required.every((wanted) => language.some((row) => matches(row, wanted) && row.verdict === 'negative'));
}

/** The tasks and languages that keep an open site from a result. */
export function stillOpen(rows: readonly CombinedRow[], required: readonly TaskLanguage[]): TaskLanguage[] {
	if (combined(rows, required) !== 'open') return [];
	const language = rows.filter(isLanguage);
	const wanted = required.length > 0 ? required : language;
	return wanted
		.filter((pair) => !language.some((row) => matches(row, pair) && row.verdict === 'negative'))
		.map(({ task, language }) => ({ task, language }));
}

function isLanguage(row: CombinedRow): boolean {
	return (row.class ?? 'language') === 'language';
}

function matches(row: TaskLanguage, wanted: TaskLanguage): boolean {
	return row.task === wanted.task && row.language === wanted.language;
}
