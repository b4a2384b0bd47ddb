import { requireProbability } from './domain';

/**
 * Benjamini and Hochberg's step-up adjustment of p values: at or below a level, the adjusted values keep the expected
 * share of false findings among all findings at that level (J R Stat Soc B 1995;57:289-300). The order of the input
 * is kept, equal values stay equal, nothing exceeds 1; no values give none.
 *
 * @throws RangeError when a value is outside 0..1
 */
export function benjaminiHochberg(ps: readonly number[]): number[] {
	ps.forEach((p, index) => requireProbability(`p value ${index + 1}`, p));
	const descending = ps.map((p, index) => ({ p, index })).sort((one, other) => other.p - one.p);
	const adjusted = new Array<number>(ps.length);
	let smallest = 1;
	descending.forEach(({ p, index }, rank) => {
		smallest = Math.min(smallest, (ps.length / (ps.length - rank)) * p);
		adjusted[index] = smallest;
	});
	return adjusted;
}
