import type { CaseState, Row } from './case-state';
import type { Effect, ResponseClass } from './vocabulary';

/**
 * What each trial of a row says, in the order of the log. A trial that waits for its score, or has two, says nothing
 * yet and is left out.
 *
 * @param asked the class the row is of
 */
export function effectsOfRow(state: CaseState, row: Pick<Row, 'trials'>, asked: ResponseClass = 'language'): Effect[] {
	return row.trials.flatMap((id) => {
		const found = state.trials.get(id)?.effect[asked] ?? 'pending';
		return found === 'pending' ? [] : [found];
	});
}
