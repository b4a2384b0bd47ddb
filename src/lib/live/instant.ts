/**
 * A time as RFC 3339 in UTC, to the microsecond: a presentation is measured finer than a millisecond.
 *
 * @param milliseconds since the epoch
 */
export function instantOf(milliseconds: number): string {
	const micros = Math.round((milliseconds % 1000) * 1000);
	const second = new Date(Math.floor(milliseconds / 1000) * 1000 + (micros === 1_000_000 ? 1000 : 0));
	return `${second.toISOString().slice(0, 19)}.${String(micros % 1_000_000).padStart(6, '0')}Z`;
}
