import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { benjaminiHochberg } from '$lib/mapping/statistics/benjamini-hochberg';
import { binomialTail } from '$lib/mapping/statistics/binomial-tail';
import { expectedFalsePositives } from '$lib/mapping/statistics/expected-false-positives';
import { fisherExact, type Alternative, type TwoByTwo } from '$lib/mapping/statistics/fisher-exact';
import { holm } from '$lib/mapping/statistics/holm';
import { normalQuantile } from '$lib/mapping/statistics/normal-quantile';
import { wilson } from '$lib/mapping/statistics/wilson';

/** An exact fraction; the denominator is above 0. */
type Fraction = [bigint, bigint];

/** A double is a whole number over a power of two: no rounding. */
function exactly(value: number): Fraction {
	let whole = 1n;
	while (!Number.isInteger(value)) {
		value *= 2;
		whole *= 2n;
	}
	return [BigInt(value), whole];
}

/** The nearest double of a fraction, to about 1 part in 10^17. */
function toNumber([part, whole]: Fraction): number {
	if (part === 0n) return 0;
	const shift = BigInt(Math.max(0, whole.toString(2).length - part.toString(2).length + 64));
	let scaled = Number((part << shift) / whole);
	for (let left = Number(shift); left > 0; left -= 512) scaled /= 2 ** Math.min(left, 512);
	return scaled;
}

function choose(n: number, k: number): bigint {
	if (k < 0 || k > n) return 0n;
	let result = 1n;
	for (let i = 1; i <= k; i++) result = (result * BigInt(n - k + i)) / BigInt(i);
	return result;
}

function exactBinomialTail(k: number, n: number, p: number): number {
	const [part, whole] = exactly(p);
	let sum = 0n;
	for (let j = k; j <= n; j++) sum += choose(n, j) * part ** BigInt(j) * (whole - part) ** BigInt(n - j);
	return toNumber([sum, whole ** BigInt(n)]);
}

/** Tables with the margins of the one given, by their first cell, and how many ways lead to each. */
function tablesWithMargins([[a, b], [c, d]]: TwoByTwo): { first: number; ways: bigint }[] {
	const found = [];
	for (let first = 0; first <= a + b; first++) {
		const ways = choose(a + b, first) * choose(c + d, a + c - first);
		if (ways > 0n) found.push({ first, ways });
	}
	return found;
}

function exactFisher(table: TwoByTwo, alternative: Alternative): number {
	const tables = tablesWithMargins(table);
	const observed = table[0][0];
	const limit = tables.find(({ first }) => first === observed)!.ways;
	const isAsFarOut = {
		greater: ({ first }: { first: number }) => first >= observed,
		less: ({ first }: { first: number }) => first <= observed,
		// 1e-7 more likely still counts as no more likely: the rule of R.
		'two-sided': ({ ways }: { ways: bigint }) => ways * 10_000_000n <= limit * 10_000_001n
	}[alternative];
	const sum = (chosen: typeof tables) => chosen.reduce((total, { ways }) => total + ways, 0n);
	return toNumber([sum(tables.filter(isAsFarOut)), sum(tables)]);
}

/** Phi(z), Marsaglia's series (J Stat Softw 2004;11(4)): all terms of one sign, so good up to |z| of 6. */
function normalProbability(z: number): number {
	let term = Math.abs(z);
	let sum = term;
	for (let odd = 3; term > sum * 1e-18; odd += 2) {
		term *= (z * z) / odd;
		sum += term;
	}
	return 0.5 + (Math.sign(z) * sum * Math.exp((-z * z) / 2)) / Math.sqrt(2 * Math.PI);
}

function expectClose(actual: number, wanted: number, relative: number): void {
	expect(Math.abs(actual - wanted), `${actual} for ${wanted}`).toBeLessThanOrEqual(relative * Math.abs(wanted));
}

const probability = fc.oneof(
	fc.tuple(fc.nat(1000), fc.integer({ min: 1, max: 1000 })).map(([a, b]) => Math.min(a, b) / Math.max(a, b)),
	fc.double({ min: 0, max: 1, noNaN: true })
);
const kOfN = fc
	.tuple(fc.nat(40), fc.nat(40))
	.map(([one, other]): [k: number, n: number] => [Math.min(one, other), Math.max(one, other)]);
const alternative = fc.constantFrom<Alternative>('greater', 'less', 'two-sided');
const counts = fc.tuple(fc.nat(25), fc.nat(25), fc.nat(25), fc.nat(90));
const table = counts.map(([a, b, c, d]): TwoByTwo => [
	[a, b],
	[c, d]
]);
const pValues = fc.array(probability, { maxLength: 25 });

describe('binomialTail', () => {
	it('is the exact sum, small tails included', () => {
		fc.assert(
			fc.property(kOfN, probability, ([k, n], p) => {
				const wanted = exactBinomialTail(k, n, p);
				const found = binomialTail(k, n, p);
				// Below 1e-300 a double has not the digits left.
				if (wanted < 1e-300) expect(found).toBeLessThan(1e-299);
				else expectClose(found, wanted, 1e-13);
			}),
			{ numRuns: 400 }
		);
	});

	it.each([
		[600, 1000, 0.5],
		[40, 1000, 0.01],
		[990, 1000, 0.985],
		[1000, 2000, 0.5]
	])('keeps its digits in a long series: %i of %i at %f', (k, n, p) => {
		expectClose(binomialTail(k, n, p), exactBinomialTail(k, n, p), 1e-11);
	});

	it('is 1 from none on, 0 beyond all, and sure at the ends of p', () => {
		expect(binomialTail(0, 0, 0.3)).toBe(1);
		expect(binomialTail(0, 5, 0)).toBe(1);
		expect(binomialTail(1, 5, 0)).toBe(0);
		expect(binomialTail(5, 5, 1)).toBe(1);
		expect(binomialTail(6, 5, 1)).toBe(0);
	});

	it.each([
		[-1, 3, 0.1, /k must be a whole number/],
		[1.5, 3, 0.1, /k must be a whole number/],
		[NaN, 3, 0.1, /k must be a whole number/],
		[1, -3, 0.1, /n must be a whole number/],
		[1, Infinity, 0.1, /n must be a whole number/],
		[1, 3, -0.1, /p must be a probability/],
		[1, 3, 1.1, /p must be a probability/],
		[1, 3, NaN, /p must be a probability/]
	])('refuses k %d, n %d, p %d', (k, n, p, message) => {
		expect(() => binomialTail(k, n, p)).toThrow(RangeError);
		expect(() => binomialTail(k, n, p)).toThrow(message);
	});
});

describe('expectedFalsePositives', () => {
	it('is the mean of the sites and the complement of none of them', () => {
		fc.assert(
			fc.property(fc.nat(60), kOfN, fc.integer({ min: 0, max: 64 }), (sites, [k, n], sixtyFourths) => {
				const p = sixtyFourths / 64;
				const one = exactBinomialTail(k, n, p);
				const found = expectedFalsePositives(sites, n, k, p);
				expectClose(found.expected, sites * one, 1e-13);
				const [part, whole] = exactly(one);
				const none: Fraction = [(whole - part) ** BigInt(sites), whole ** BigInt(sites)];
				expectClose(found.atLeastOne, toNumber([none[1] - none[0], none[1]]), 1e-12);
			})
		);
	});

	it.each([
		[0, 0, 0],
		[7, 7, 1]
	])('with %i sites that are all positive expects %i', (sites, expected, atLeastOne) => {
		expect(expectedFalsePositives(sites, 3, 2, 1)).toEqual({ expected, atLeastOne });
	});

	it.each([-1, 2.5, NaN])('refuses %d sites', (sites) => {
		expect(() => expectedFalsePositives(sites, 3, 2, 0.1)).toThrow(/sites must be a whole number/);
	});

	it('refuses what the binomial tail refuses', () => {
		expect(() => expectedFalsePositives(0, 3, 2, 2)).toThrow(RangeError);
	});
});

describe('fisherExact', () => {
	it('is the exact hypergeometric sum', () => {
		fc.assert(
			fc.property(table, alternative, (cells, side) => {
				expectClose(fisherExact(cells, side), exactFisher(cells, side), 1e-12);
			}),
			{ numRuns: 400 }
		);
	});

	it('does not change when the table is turned, and changes sides when its rows or columns are swapped', () => {
		const OTHER = { greater: 'less', less: 'greater', 'two-sided': 'two-sided' } as const;
		fc.assert(
			fc.property(table, alternative, (cells, side) => {
				const [[a, b], [c, d]] = cells;
				const found = fisherExact(cells, side);
				expectClose(
					fisherExact(
						[
							[a, c],
							[b, d]
						],
						side
					),
					found,
					1e-12
				);
				expectClose(
					fisherExact(
						[
							[c, d],
							[a, b]
						],
						OTHER[side]
					),
					found,
					1e-12
				);
				expectClose(
					fisherExact(
						[
							[b, a],
							[d, c]
						],
						OTHER[side]
					),
					found,
					1e-12
				);
			})
		);
	});

	it('takes tables of the same likelihood together whatever the rounding: mirrored margins double', () => {
		fc.assert(
			fc.property(fc.nat(30), fc.nat(30), (a, b) => {
				fc.pre(a !== b);
				const cells: TwoByTwo = [
					[a, b],
					[b, a]
				];
				const side = a > b ? 'greater' : 'less';
				expectClose(fisherExact(cells, 'two-sided'), 2 * fisherExact(cells, side), 1e-12);
			})
		);
	});

	it.each<[TwoByTwo]>([
		[
			[
				[0, 0],
				[0, 0]
			]
		],
		[
			[
				[0, 0],
				[3, 4]
			]
		],
		[
			[
				[0, 3],
				[0, 80]
			]
		],
		[
			[
				[5, 0],
				[7, 0]
			]
		]
	])('is 1 when the margins leave no choice: %j', (cells) => {
		for (const side of ['greater', 'less', 'two-sided'] as const) expect(fisherExact(cells, side)).toBe(1);
	});

	it.each<[TwoByTwo, RegExp]>([
		[
			[
				[-1, 1],
				[1, 1]
			],
			/a must be a whole number/
		],
		[
			[
				[1, 0.5],
				[1, 1]
			],
			/b must be a whole number/
		],
		[
			[
				[1, 1],
				[NaN, 1]
			],
			/c must be a whole number/
		],
		[
			[
				[1, 1],
				[1, Infinity]
			],
			/d must be a whole number/
		]
	])('refuses %j', (cells, message) => {
		expect(() => fisherExact(cells, 'greater')).toThrow(RangeError);
		expect(() => fisherExact(cells, 'greater')).toThrow(message);
	});

	it('refuses an alternative it does not know', () => {
		expect(() =>
			fisherExact(
				[
					[1, 1],
					[1, 1]
				],
				'both' as Alternative
			)
		).toThrow(/alternative must be .* not both/);
	});
});

describe('normalQuantile', () => {
	it('is where the normal distribution reaches p', () => {
		fc.assert(
			fc.property(fc.double({ min: 1e-6, max: 1 - 1e-6, noNaN: true }), (p) => {
				expect(Math.abs(normalProbability(normalQuantile(p)) - p)).toBeLessThan(2e-15);
			}),
			{ numRuns: 500 }
		);
	});

	it('mirrors about one half, where it is 0, and is infinite at the ends', () => {
		fc.assert(
			fc.property(fc.integer({ min: 1, max: 1023 }), (part) => {
				expect(normalQuantile(1 - part / 1024) + normalQuantile(part / 1024)).toBe(0);
			})
		);
		expect(normalQuantile(0.5)).toBe(0);
		expect(normalQuantile(0)).toBe(-Infinity);
		expect(normalQuantile(1)).toBe(Infinity);
	});

	it.each([-0.1, 1.1, NaN])('refuses %d', (p) => {
		expect(() => normalQuantile(p)).toThrow(/p must be a probability/);
	});
});

describe('wilson', () => {
	const confidence = fc.double({ min: 0.5, max: 0.9999, noNaN: true });
	const trials = fc
		.tuple(fc.nat(300), fc.integer({ min: 1, max: 300 }))
		.map(([one, other]): [k: number, n: number] => [Math.min(one, other), Math.max(one, other)]);

	it('holds the proportion found, within 0 to 1', () => {
		fc.assert(
			fc.property(trials, confidence, ([k, n], level) => {
				const [low, high] = wilson(k, n, level);
				expect(low).toBeGreaterThanOrEqual(0);
				expect(low).toBeLessThanOrEqual(k / n);
				expect(high).toBeGreaterThanOrEqual(k / n);
				expect(high).toBeLessThanOrEqual(1);
			})
		);
	});

	it('has the proportions as limits whose score statistic is just the quantile', () => {
		fc.assert(
			fc.property(trials, ([k, n]) => {
				const z = 1.959963984540054;
				for (const limit of wilson(k, n)) {
					// (k/n - limit)^2 = z^2 limit (1 - limit) / n, times n
					expect(Math.abs(n * (k / n - limit) ** 2 - z * z * limit * (1 - limit))).toBeLessThan(1e-12);
				}
			})
		);
	});

	it('mirrors: what is disturbed in one is intact in the other', () => {
		fc.assert(
			fc.property(trials, confidence, ([k, n], level) => {
				const [low, high] = wilson(k, n, level);
				const [mirroredLow, mirroredHigh] = wilson(n - k, n, level);
				expect(Math.abs(1 - mirroredHigh - low)).toBeLessThan(1e-15);
				expect(Math.abs(1 - mirroredLow - high)).toBeLessThan(1e-15);
			})
		);
	});

	it('widens with the confidence', () => {
		fc.assert(
			fc.property(trials, ([k, n]) => {
				const [low, high] = wilson(k, n);
				const [lower, higher] = wilson(k, n, 0.99);
				expect(higher - lower).toBeGreaterThan(high - low);
			})
		);
	});

	it('knows nothing without trials, and touches the end exactly when all are alike', () => {
		expect(wilson(0, 0)).toEqual([0, 1]);
		expect(wilson(0, 7)[0]).toBe(0);
		expect(wilson(7, 7)[1]).toBe(1);
	});

	it.each([
		[-1, 3, 0.95, /k must be a whole number/],
		[1, 3.5, 0.95, /n must be a whole number/],
		[4, 3, 0.95, /k must not exceed n: 4 of 3/],
		[1, 3, 0, /confidence must lie between 0 and 1/],
		[1, 3, 1, /confidence must lie between 0 and 1/],
		[1, 3, 95, /confidence must lie between 0 and 1/],
		[0, 0, NaN, /confidence must lie between 0 and 1/]
	])('refuses %d of %d at %d', (k, n, level, message) => {
		expect(() => wilson(k, n, level)).toThrow(RangeError);
		expect(() => wilson(k, n, level)).toThrow(message);
	});
});

describe('holm and benjaminiHochberg', () => {
	const BOTH = [
		['holm', holm],
		['benjaminiHochberg', benjaminiHochberg]
	] as const;

	it('never fall below the raw value nor exceed 1, and Holm is never the milder', () => {
		fc.assert(
			fc.property(pValues, (ps) => {
				const strict = holm(ps);
				const mild = benjaminiHochberg(ps);
				expect([strict.length, mild.length]).toEqual([ps.length, ps.length]);
				ps.forEach((p, index) => {
					expect(mild[index]).toBeGreaterThanOrEqual(p);
					expect(strict[index]).toBeGreaterThanOrEqual(mild[index]!);
					expect(strict[index]).toBeLessThanOrEqual(1);
				});
			})
		);
	});

	it('follow the definition, taken literally for each value', () => {
		fc.assert(
			fc.property(pValues, (ps) => {
				const sorted = [...ps].sort((one, other) => one - other);
				const m = ps.length;
				const strict = holm(ps);
				const mild = benjaminiHochberg(ps);
				ps.forEach((p, index) => {
					const upTo = sorted.map((q, rank) => (q <= p ? Math.min(1, (m - rank) * q) : 0));
					const from = sorted.map((q, rank) => (q >= p ? Math.min(1, (m * q) / (rank + 1)) : 1));
					expectClose(strict[index]!, Math.max(...upTo), 1e-15);
					expectClose(mild[index]!, Math.min(...from), 1e-15);
				});
			})
		);
	});

	it.each(BOTH)('%s keeps the order of the values, and equal ones equal', (_name, adjust) => {
		fc.assert(
			fc.property(pValues, (ps) => {
				const adjusted = adjust([...ps, ...ps.slice(0, 2)]);
				for (const [i, p] of ps.entries()) {
					for (const [j, q] of ps.entries()) if (p <= q) expect(adjusted[i]).toBeLessThanOrEqual(adjusted[j]!);
				}
				expect(adjusted.slice(ps.length)).toEqual(adjusted.slice(0, Math.min(2, ps.length)));
			})
		);
	});

	it.each(BOTH)('%s gives each value the same whatever the order it is asked in', (_name, adjust) => {
		const shuffled = pValues.chain((ps) =>
			fc.record({
				ps: fc.constant(ps),
				order: fc.shuffledSubarray([...ps.keys()], { minLength: ps.length })
			})
		);
		fc.assert(
			fc.property(shuffled, ({ ps, order }) => {
				const adjusted = adjust(ps);
				expect(adjust(order.map((index) => ps[index]!))).toEqual(order.map((index) => adjusted[index]));
			})
		);
	});

	it.each(BOTH)('%s leaves its input alone, one value as it is, and none none', (_name, adjust) => {
		const ps = Object.freeze([0.4, 0.01, 0.2]);
		expect(adjust(ps)).toHaveLength(3);
		expect(adjust([0.03])).toEqual([0.03]);
		expect(adjust([])).toEqual([]);
	});

	it.each(BOTH)('%s refuses what is no probability, naming its place', (_name, adjust) => {
		for (const wrong of [-0.01, 1.01, NaN]) {
			expect(() => adjust([0.5, wrong])).toThrow(RangeError);
			expect(() => adjust([0.5, wrong])).toThrow(/p value 2 must be a probability/);
		}
	});
});
