import type { CaseState } from './case-state';
import type { TaskLanguage } from './events';

/** The tasks and languages of a mapping: those the protocol requires, then the others in the order they were tried. */
export function taskLanguages(state: CaseState): TaskLanguage[] {
	const found = new Map<string, TaskLanguage>();
	for (const { task, language } of [...state.protocol.required, ...state.rows.language.values()]) {
		const key = `${task} ${language}`;
		if (!found.has(key)) found.set(key, { task, language });
	}
	return [...found.values()];
}
