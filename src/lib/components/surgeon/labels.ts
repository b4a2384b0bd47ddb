import { share, toGo } from '$lib/messages/surgeon';
import { KIND_NAMES } from '$lib/messages/trade';
import type { TagView } from './tag-views';

/** What may stand under a ring, the fullest first; the first that fits is taken. */
export function labelsOf({ result, row, error }: TagView): string[] {
	if (result === 'positive') return error ? [KIND_NAMES[error]] : [];
	if (result === 'negative') return row && row.disturbed > 0 ? [share(row)] : [];
	return row && row.remaining > 0 && row.valid > 0 ? [toGo(row.remaining)] : [];
}
