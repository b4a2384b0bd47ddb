import type { CaseState, Row } from './case-state';
import type { TagResult } from './sites';
import { CLASSES, type ResponseClass } from './vocabulary';

/** A row, and the class it is of. */
export interface ClassRow {
	class: ResponseClass;
	row: Row;
}

/**
 * The row that one ring for the whole tag shows: one that has the combined result itself where there is any, and of
 * those the one with the largest share of disturbed trials. Language goes before speech-motor, then more trials
 * before fewer. Null for a tag without a row.
 */
export function decidingRow(state: CaseState, { tag, result }: Pick<TagResult, 'tag' | 'result'>): ClassRow | null {
	const rows = CLASSES.flatMap((asked) =>
		[...state.rows[asked].values()].filter((row) => row.tag === tag).map((row): ClassRow => ({ class: asked, row }))
	);
	const [first] = rows.toSorted(
		(a, b) =>
			Number(b.row.verdict === result) - Number(a.row.verdict === result) ||
			share(b.row) - share(a.row) ||
			CLASSES.indexOf(a.class) - CLASSES.indexOf(b.class) ||
			b.row.valid - a.row.valid
	);
	return first ?? null;
}

function share({ disturbed, valid }: Row): number {
	return valid === 0 ? 0 : disturbed / valid;
}
