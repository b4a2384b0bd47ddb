import { binomialTail } from './binomial-tail';
import { requireCount } from './domain';

/**
 * What chance alone would give over a field of `sites` that have nothing to do with language: each has `n` trials, is
 * called positive from `k` disturbed ones on, and a trial goes wrong with probability `p` without any stimulation.
 * Binomial at each site, sites independent of one another.
 *
 * @returns `expected`: sites called positive on average; `atLeastOne`: the probability that there is one or more
 * @throws RangeError when `sites`, `n` or `k` is no whole number of at least 0, or `p` is outside 0..1
 */
export function expectedFalsePositives(
	sites: number,
	n: number,
	k: number,
	p: number
): { expected: number; atLeastOne: number } {
	requireCount('sites', sites);
	const one = binomialTail(k, n, p);
	if (sites === 0) return { expected: 0, atLeastOne: 0 };
	// 1 - (1 - one) ** sites, without losing a small `one` next to 1.
	return { expected: sites * one, atLeastOne: -Math.expm1(sites * Math.log1p(-one)) };
}
