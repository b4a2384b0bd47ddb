import { emptyCase } from '../../src/lib/mapping/case-state';
import type { LogEvent } from '../../src/lib/mapping/events';
import { fold as foldLog } from '../../src/lib/mapping/fold';
import { median, type Sample } from './distribution';
import type { Plan } from './plan';
import { realisticLog } from './realistic-log';
import { columns, distributionRow, heading, milliseconds, ratioRow, row, target } from './report';

const ENTRIES = 10_000;
const REPEATS = 15;
const WHOLE_MOST = 20;
const EACH_MOST = 0.05;

/** The fold of a long log, whole and entry by entry, beside reading the same log from its JSON. */
export function fold({ runs, share }: Plan): void {
	const log = realisticLog(ENTRIES);
	const text = JSON.stringify(log);
	const lines = log.map((event) => JSON.stringify(event));
	const repeats = Math.max(3, Math.round(REPEATS * share));
	const whole = { wordkeep: [] as Sample[], bare: [] as Sample[] };
	const each = { wordkeep: [] as Sample[], bare: [] as Sample[] };
	for (let run = -1; run < runs; run++) {
		const measured = measure(log, text, lines, repeats);
		// The first run warms the compiler up.
		if (run < 0) continue;
		whole.wordkeep.push(measured.whole);
		whole.bare.push(measured.parse);
		each.wordkeep.push(measured.each);
		each.bare.push(measured.parseEach);
	}

	heading(`fold: ${ENTRIES} entries of an invented mapping, beside JSON.parse of the same log`);
	columns('p50 ms', 'p95', 'p99', 'max', 'n');
	distributionRow('whole', whole.wordkeep);
	distributionRow('JSON.parse of the whole', whole.bare);
	ratioRow('ratio', whole, null);
	row('the least', milliseconds(Math.min(...whole.wordkeep.flat())));
	const wholeTime = median(whole.wordkeep.map(median));
	target(`${ENTRIES} entries whole under ${WHOLE_MOST} ms: ${milliseconds(wholeTime)} ms`, wholeTime < WHOLE_MOST);
	distributionRow('one by one, each', each.wordkeep);
	distributionRow('JSON.parse of one, each', each.bare);
	ratioRow('ratio', each, null);
	const eachTime = median(each.wordkeep.map(mean));
	row('mean of one by one', milliseconds(eachTime));
	target(`one entry under ${EACH_MOST} ms in the mean: ${milliseconds(eachTime)} ms`, eachTime < EACH_MOST);
}

function measure(log: LogEvent[], text: string, lines: string[], repeats: number) {
	const measured = { whole: [] as Sample, parse: [] as Sample, each: [] as Sample, parseEach: [] as Sample };
	for (let repeat = 0; repeat < repeats; repeat++) {
		measured.whole.push(time(() => foldLog(log)));
		measured.parse.push(time(() => JSON.parse(text)));
	}
	let state = emptyCase();
	for (const [index, event] of log.entries()) {
		measured.each.push(time(() => (state = foldLog([event], state))));
		measured.parseEach.push(time(() => JSON.parse(lines[index]!)));
	}
	return measured;
}

/** Milliseconds that some work takes. */
function time(work: () => unknown): number {
	const begun = performance.now();
	work();
	return performance.now() - begun;
}

function mean(sample: Sample): number {
	return sample.reduce((sum, value) => sum + value, 0) / sample.length;
}
