import { caseItems } from '$lib/mapping/case-items';
import type { CaseState } from '$lib/mapping/case-state';
import type { LogNames } from '$lib/messages/case-log';

/** What the words of the case log call items, trials and entries, as the case stands. */
export function logNames(state: CaseState): LogNames {
	const answers = new Map(caseItems(state).map(({ id, answer }) => [id, answer]));
	return {
		item: (id) => answers.get(id) ?? id,
		trial: (id) => {
			const event = state.records.get(id)?.presented[0]?.event;
			return event?.type === 'trial-presented' ? event.data : null;
		},
		entry: (id) => state.entries.get(id)?.event ?? null
	};
}
