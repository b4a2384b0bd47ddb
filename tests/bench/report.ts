import { distribution, median, overRuns, type Distribution, type Sample } from './distribution';

/** What Wordkeep and its bare control took, run by run; the two were measured in turn in each run. */
export interface Comparison {
	wordkeep: Sample[];
	bare: Sample[];
}

type Quantile = 'p50' | 'p95' | 'p99';

const NAME_WIDTH = 46;

export function heading(text: string): void {
	console.log(`\n${text}`);
}

export function columns(...names: string[]): void {
	row('', ...names);
}

export function row(name: string, ...cells: string[]): void {
	console.log(`  ${name.padEnd(NAME_WIDTH)}${cells.map((cell) => cell.padStart(9)).join('')}`);
}

export function distributionColumns(unit: string): void {
	columns(`p50 ${unit}`, 'p95', 'p99', 'max', 'n');
}

/** A line with the quantiles of what was measured, run by run. */
export function distributionRow(name: string, runs: Sample[]): void {
	const { p50, p95, p99, max, n }: Distribution = overRuns(runs);
	row(name, ...[p50, p95, p99, max].map(milliseconds), String(n));
}

/**
 * A line with how many times the bare control's quantile ours is, each taken within one run; the median of the runs,
 * then every run's own p99.
 *
 * @param most target for the ratio of the p99, or null where there is none
 */
export function ratioRow(name: string, { wordkeep, bare }: Comparison, most: number | null): void {
	const of = (quantile: Quantile) =>
		wordkeep.map((sample, run) => distribution(sample)[quantile] / distribution(bare[run]!)[quantile]);
	const p99 = of('p99');
	row(name, ...[median(of('p50')), median(of('p95')), median(p99)].map(times));
	const runs = p99.map(times).join(', ');
	console.log(`  ${''.padEnd(NAME_WIDTH)}  p99 of each run: ${runs}`);
	if (most !== null) target(`p99 within ${most}x of the bare control`, median(p99) <= most);
}

/** Says whether a target was met in this run. */
export function target(text: string, met: boolean): void {
	console.log(`  ${met ? 'met   ' : 'MISSED'}  ${text}`);
}

export function milliseconds(value: number): string {
	return value.toFixed(Math.abs(value) < 0.1 ? 4 : 2);
}

export function times(value: number): string {
	return `${value.toFixed(2)}x`;
}
