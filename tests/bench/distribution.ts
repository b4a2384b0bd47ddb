/** What was measured in one run, in milliseconds unless said otherwise. */
export type Sample = number[];

export interface Distribution {
	n: number;
	p50: number;
	p95: number;
	p99: number;
	max: number;
}

/** Quantiles by nearest rank: each is a value that was measured. */
export function distribution(sample: Sample): Distribution {
	if (sample.length === 0) throw new RangeError('nothing was measured');
	const sorted = sample.toSorted((a, b) => a - b);
	const quantile = (share: number) => sorted[Math.max(0, Math.ceil(share * sorted.length) - 1)]!;
	return {
		n: sorted.length,
		p50: quantile(0.5),
		p95: quantile(0.95),
		p99: quantile(0.99),
		max: sorted.at(-1)!
	};
}

/** The middle value; the lower of two. */
export function median(values: readonly number[]): number {
	return distribution([...values]).p50;
}

/** One distribution for several runs: each quantile is the median of the runs' own; n and max are over all of them. */
export function overRuns(runs: readonly Sample[]): Distribution {
	const each = runs.map(distribution);
	return {
		n: each.reduce((sum, { n }) => sum + n, 0),
		p50: median(each.map(({ p50 }) => p50)),
		p95: median(each.map(({ p95 }) => p95)),
		p99: median(each.map(({ p99 }) => p99)),
		max: Math.max(...each.map(({ max }) => max))
	};
}
