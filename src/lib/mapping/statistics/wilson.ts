import { requireCount } from './domain';
import { normalQuantile } from './normal-quantile';

/**
 * Wilson's score interval, without continuity correction, of a proportion of `k` in `n`: the proportions, as fractions
 * of 1, that a normal test at the level 1 - `confidence` does not refuse (Wilson, J Am Stat Assoc 1927;22:209-212;
 * method 3 of Newcombe, Stat Med 1998;17:857-872). It stays within 0..1; the lower limit is exactly 0 for k = 0, the
 * upper one exactly 1 for k = n, and no trials at all tell nothing: [0, 1].
 *
 * @throws RangeError when `k` or `n` is no whole number of at least 0, `k` exceeds `n`, or `confidence` is not
 * between 0 and 1
 */
export function wilson(k: number, n: number, confidence = 0.95): [low: number, high: number] {
	requireCount('k', k);
	requireCount('n', n);
	if (k > n) throw new RangeError(`k must not exceed n: ${k} of ${n}`);
	if (!(confidence > 0 && confidence < 1)) {
		throw new RangeError(`confidence must lie between 0 and 1, not ${confidence}`);
	}
	if (n === 0) return [0, 1];
	const z = -normalQuantile((1 - confidence) / 2);
	return [lowerLimit(k, n, z), 1 - lowerLimit(n - k, n, z)];
}

/** The smaller root, written as the product of both over the larger one: nothing cancels, and k = 0 gives 0. */
function lowerLimit(k: number, n: number, z: number): number {
	return ((k / n) * k) / (k + (z * z) / 2 + z * Math.sqrt((k / n) * (n - k) + (z * z) / 4));
}
