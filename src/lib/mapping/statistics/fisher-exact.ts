import { requireCount } from './domain';

export type Alternative = 'greater' | 'less' | 'two-sided';

/** Counts: rows are two conditions (stimulated, control), columns two outcomes (disturbed, intact). */
export type TwoByTwo = readonly [readonly [number, number], readonly [number, number]];

/** Two tables are equally likely when they differ by rounding only: the tolerance of R's `fisher.test`. */
const SAME = 1 + 1e-7;

/**
 * P value of Fisher's exact test of a two by two table: of all tables with its margins, the probability of those as
 * far out as it (Fisher, The Design of Experiments, 1935, chapter 2). `greater` and `less` speak of the first cell;
 * `two-sided` takes every table that is no more likely than the one observed, as R does. A table whose margins leave
 * no choice (an empty row or column, or no trials at all) has p = 1.
 *
 * @throws RangeError when a count is no whole number of at least 0, or the alternative is none of the three
 */
export function fisherExact(table: TwoByTwo, alternative: Alternative): number {
	const [[a, b], [c, d]] = table;
	for (const [name, count] of Object.entries({ a, b, c, d })) requireCount(name, count);

	const lowest = Math.max(0, a - d);
	const weights = hypergeometricWeights(lowest, Math.min(a + b, a + c), a + b, a + c, d - a);
	const total = sum(weights);
	const observed = a - lowest;
	switch (alternative) {
		case 'greater':
			return sum(weights.slice(observed)) / total;
		case 'less':
			return sum(weights.slice(0, observed + 1)) / total;
		case 'two-sided': {
			const limit = weights[observed]! * SAME;
			return sum(weights.filter((weight) => weight <= limit)) / total;
		}
		default:
			throw new RangeError(`alternative must be greater, less or two-sided, not ${String(alternative)}`);
	}
}

/**
 * How likely each value of the first cell from `lowest` to `highest` is, next to the likeliest (which has weight 1):
 * with margins `row` and `column` of that cell, the last cell being the first plus `shift`.
 */
function hypergeometricWeights(lowest: number, highest: number, row: number, column: number, shift: number): number[] {
	/** weight of `first` + 1 over weight of `first` */
	const ratio = (first: number) => ((row - first) / (first + 1)) * ((column - first) / (first + 1 + shift));
	let mode = lowest;
	while (mode < highest && ratio(mode) >= 1) mode++;

	const weights = new Array<number>(highest - lowest + 1).fill(1);
	for (let first = mode; first < highest; first++) {
		weights[first + 1 - lowest] = weights[first - lowest]! * ratio(first);
	}
	for (let first = mode - 1; first >= lowest; first--) {
		weights[first - lowest] = weights[first + 1 - lowest]! / ratio(first);
	}
	return weights;
}

function sum(values: number[]): number {
	return values.reduce((total, value) => total + value, 0);
}
