import { requireProbability } from './domain';

/**
 * Holm's step-down adjustment of p values: at or below a level, the adjusted values keep the chance of even one false
 * finding among all of them at that level (Holm, Scand J Stat 1979;6:65-70). The order of the input is kept, equal
 * values stay equal, nothing exceeds 1; no values give none.
 *
 * @throws RangeError when a value is outside 0..1
 */
export function holm(ps: readonly number[]): number[] {
	ps.forEach((p, index) => requireProbability(`p value ${index + 1}`, p));
	const ascending = ps.map((p, index) => ({ p, index })).sort((one, other) => one.p - other.p);
	const adjusted = new Array<number>(ps.length);
	let largest = 0;
	ascending.forEach(({ p, index }, rank) => {
		largest = Math.max(largest, Math.min(1, (ps.length - rank) * p));
		adjusted[index] = largest;
	});
	return adjusted;
}
