import { requireCount, requireProbability } from './domain';

/**
 * P(X >= k) for X binomial: the chance that at least `k` of `n` trials are disturbed when each is disturbed with
 * probability `p` whatever the site. Exactly 1 for k = 0, exactly 0 for k > n.
 *
 * The side of `k` away from the mean is summed, so that a small tail keeps its digits; terms follow from one another
 * by (n - j) p / ((j + 1) (1 - p)) (Johnson, Kemp, Kotz: Univariate Discrete Distributions, 3rd ed. 2005, chapter 3).
 *
 * @throws RangeError when `k` or `n` is no whole number of at least 0, or `p` is outside 0..1
 */
export function binomialTail(k: number, n: number, p: number): number {
	requireCount('k', k);
	requireCount('n', n);
	requireProbability('p', p);
	if (k === 0) return 1;
	if (k > n) return 0;
	return k > n * p ? sumUpwards(k, n, p) : 1 - sumUpwards(n - k + 1, n, 1 - p);
}

/** P(X >= k) for k above the mean, where each term is smaller than the one before. */
function sumUpwards(k: number, n: number, p: number): number {
	let term = probabilityOf(k, n, p);
	let sum = term;
	for (let j = k; j < n && term > sum * Number.EPSILON; j++) {
		term *= ((n - j) / (j + 1)) * (p / (1 - p));
		sum += term;
	}
	return Math.min(1, sum);
}

/** P(X = k), its factors taken in an order that keeps the product near 1 as long as any are left to do so. */
function probabilityOf(k: number, n: number, p: number): number {
	const chosen = Math.min(k, n - k);
	let product = 1;
	let hits = k;
	let misses = n - k;
	for (let i = 1; i <= chosen; i++) {
		product *= (n - chosen + i) / i;
		while (product > 1 && hits + misses > 0) {
			if (hits > 0) {
				product *= p;
				hits--;
			} else {
				product *= 1 - p;
				misses--;
			}
		}
	}
	return product * p ** hits * (1 - p) ** misses;
}
