/**
 * The fold against the event contract, on logs nobody thought of: whatever the order, the cut, the resends and the state
 * of the network, the results are those of a plain model that reads the whole log.
 */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { CaseState, Row } from '../../../src/lib/mapping/case-state';
import { controlRates } from '../../../src/lib/mapping/controls';
import type { EventType, LogEvent } from '../../../src/lib/mapping/events';
import { fold } from '../../../src/lib/mapping/fold';
import { repeatedPresentations, sites, tagResults } from '../../../src/lib/mapping/sites';
import { CLASSES } from '../../../src/lib/mapping/vocabulary';
import {
	arbitraryLog,
	arbitraryLogWithoutWithdrawals,
	arbitraryLogWithResends,
	arbitraryTwoDevices
} from './arbitrary-log';
import { received, waiting } from './entry';
import { readLog, standingEntries } from './naive-model';

/** A fixed seed: a failure is the same on every machine, and its log is printed. */
const runs = (numRuns: number) => ({ numRuns, seed: 20310305 });

function withoutTrials(row: Row) {
	return Object.fromEntries(Object.entries(row).filter(([field]) => field !== 'trials')) as Omit<Row, 'trials'>;
}

/** Everything a screen shows of a case, in an order of its own. */
function results(state: CaseState) {
	return {
		language: sites(state, 'language').map(withoutTrials),
		'speech-motor': sites(state, 'speech-motor').map(withoutTrials),
		tags: tagResults(state)
	};
}

function sorted<T extends { tag: string; task?: string; language?: string }>(rows: T[]): T[] {
	const key = ({ tag, task, language }: T) => JSON.stringify([tag, task, language]);
	return [...rows].sort((a, b) => (key(a) < key(b) ? -1 : 1));
}

function inAnyOrder({ language, 'speech-motor': speechMotor, tags }: ReturnType<typeof results>) {
	return { language: sorted(language), 'speech-motor': sorted(speechMotor), tags: sorted(tags.map(openInAnyOrder)) };
}

function openInAnyOrder<T extends { open: { task: string; language: string }[] }>(tag: T): T {
	return { ...tag, open: sorted(tag.open.map((pair) => ({ tag: '', ...pair }))) };
}

function modelResults(log: readonly LogEvent[]) {
	const model = readLog(log);
	return { language: model.rows('language'), 'speech-motor': model.rows('speech-motor'), tags: model.tags() };
}

function contested(state: CaseState): string[] {
	return [...state.trials.values()]
		.filter((trial) => trial.contested)
		.map((trial) => trial.id)
		.sort();
}

function expectSameAsModel(log: readonly LogEvent[]): void {
	const state = fold(log);
	const model = readLog(log);
	expect(inAnyOrder(results(state))).toEqual(inAnyOrder(modelResults(log)));
	expect([...state.trials.keys()].sort()).toEqual(model.presentations.map(({ data }) => data.trial).sort());
	for (const [id, trial] of state.trials) {
		expect([...trial.standing].sort()).toEqual(
			model
				.standingScores(id)
				.map((score) => score.id)
				.sort()
		);
		const presented = model.presentations.find(({ data }) => data.trial === id)!;
		for (const asked of CLASSES) expect(trial.effect[asked]).toBe(model.standing(presented, asked));
	}
}

describe('the logs that are tried', () => {
	it('hold every situation the contract speaks of, many times', () => {
		const seen: Record<string, number> = {};
		const see = (what: string, times = 1) => (seen[what] = (seen[what] ?? 0) + times);
		for (const log of fc.sample(arbitraryLog, { numRuns: 300, seed: 1 })) {
			const model = readLog(log);
			const withdrawals = log.filter(({ type }) => type === 'entry-withdrawn');
			for (const asked of CLASSES) {
				for (const row of model.rows(asked)) {
					see(`${asked} ${row.verdict}`);
					if (row.settled) see(`settled ${row.settled}`);
					if (row.excluded > 0) see('excluded');
					if (row.milliamps && row.milliamps[0] < row.milliamps[1]) see('currents');
				}
			}
			for (const { result } of model.tags()) see(`tag ${result}`);
			for (const { data } of model.presentations) if (model.standingScores(data.trial).length > 1) see('contested');
			see('repeated', repeatedPresentations(fold(log)).length);
			see(
				'withdrawn withdrawals',
				withdrawals.filter(({ id }) => model.entries.every((entry) => entry.id !== id)).length
			);
		}
		for (const asked of CLASSES) {
			for (const verdict of ['untested', 'open', 'positive', 'negative']) {
				expect(seen[`${asked} ${verdict}`], `${asked} ${verdict}`).toBeGreaterThan(20);
			}
		}
		for (const result of ['untested', 'open', 'positive', 'negative']) {
			expect(seen[`tag ${result}`], `tag ${result}`).toBeGreaterThan(20);
		}
		for (const what of ['settled positive', 'settled negative', 'excluded', 'currents', 'contested', 'repeated']) {
			expect(seen[what], what).toBeGreaterThan(20);
		}
		expect(seen['withdrawn withdrawals']).toBeGreaterThan(100);
	});
});

describe('the fold and the plain model', () => {
	it('give the same rows, tags, standing scores and effects', () => {
		fc.assert(fc.property(arbitraryLog, expectSameAsModel), runs(600));
	});

	it('give the same when entries come again', () => {
		fc.assert(fc.property(arbitraryLogWithResends, expectSameAsModel), runs(300));
	});

	it('give the same while some or all entries still wait on their device', () => {
		fc.assert(
			fc.property(arbitraryLog, fc.nat(60), (log, sent) => {
				expectSameAsModel([...log.slice(0, sent), ...waiting(log.slice(sent))]);
			}),
			runs(300)
		);
	});
});

describe('the fold', () => {
	it('is the same for every cut: fold(a ++ b) = fold(b, fold(a))', () => {
		fc.assert(
			fc.property(arbitraryLogWithResends, fc.nat(70), fc.nat(70), (log, first, second) => {
				const [from, to] = [Math.min(first, second), Math.max(first, second)];
				const whole = fold(log);
				const inThree = fold(log.slice(to), fold(log.slice(from, to), fold(log.slice(0, from))));
				expect(inThree).toEqual(whole);
				expect(controlRates(inThree)).toEqual(controlRates(whole));
			}),
			runs(500)
		);
	});

	it('is the same for one entry at a time', () => {
		fc.assert(
			fc.property(arbitraryLogWithResends, (log) => {
				expect(log.reduce((state, entry) => fold([entry], state), fold([]))).toEqual(fold(log));
			}),
			runs(300)
		);
	});

	it('takes an entry that comes again for the same entry', () => {
		fc.assert(
			fc.property(arbitraryLogWithResends, (log) => {
				const once = log.filter((entry, index) => log.findIndex((other) => other.id === entry.id) === index);
				expect(fold(log)).toEqual(fold(once));
			}),
			runs(300)
		);
	});

	it('never changes the entries it is given', () => {
		fc.assert(
			fc.property(arbitraryLogWithResends, (log) => {
				const before = structuredClone(log);
				fold(log);
				expect(log).toEqual(before);
			}),
			runs(100)
		);
	});

	it('is that of the log as if a withdrawn entry had never been there', () => {
		fc.assert(
			fc.property(arbitraryLog, (log) => {
				const left = standingEntries(log).filter(({ type }) => type !== 'entry-withdrawn');
				expect(results(fold(log))).toEqual(results(fold(left)));
			}),
			runs(300)
		);
	});

	it('gives the same when entries come before what they name', () => {
		const group = (type: EventType) => type.replace(/-(placed|removed|opened|closed)$/, '');
		fc.assert(
			fc.property(arbitraryLogWithoutWithdrawals, fc.infiniteStream(fc.nat()), (log, random) => {
				const groups = [...new Set(log.map(({ type }) => group(type)))];
				const rank = new Map(groups.map((name) => [name, random.next().value as number]));
				// Kinds of entry change places with each other; entries of one kind keep their order.
				const moved = [...log].sort((a, b) => rank.get(group(a.type))! - rank.get(group(b.type))!);
				expect(results(fold(received(moved)))).toEqual(results(fold(log)));
			}),
			runs(500)
		);
	});
});

describe('entries that wait on their device', () => {
	it('are, once received, as if they had been folded with their receipt', () => {
		fc.assert(
			fc.property(arbitraryLog, fc.array(fc.nat(60), { maxLength: 6 }), (log, cuts) => {
				const state = fold(waiting(log));
				// The log arrives in pieces of any size.
				const edges = [0, ...cuts.sort((a, b) => a - b), log.length];
				for (const [index, edge] of edges.slice(1).entries()) fold(log.slice(edges[index], edge), state);
				expect(state).toEqual(fold(log));
			}),
			runs(500)
		);
	});

	it('take their place in the log when entries of another device were received before them', () => {
		fc.assert(
			fc.property(arbitraryLog, fc.infiniteStream(fc.boolean()), (log, random) => {
				const own = new Set(log.filter(() => random.next().value).map(({ id }) => id));
				const outbox = log.filter(({ id }) => own.has(id));
				const state = fold([]);
				let made = 0;
				let received = 0;
				while (received < log.length) {
					// The device makes an entry now and then, and always before it can be received.
					if (made < outbox.length && (random.next().value || outbox[made]!.id === log[received]!.id)) {
						fold(waiting([outbox[made++]!]), state);
					} else fold([log[received++]!], state);
					const seen = [...log.slice(0, received), ...waiting(outbox.slice(0, made))];
					if (received % 7 === 0) expect(inAnyOrder(results(state))).toEqual(inAnyOrder(modelResults(seen)));
				}
				expect(state).toEqual(fold(log));
				expect(results(state)).toEqual(results(fold(log)));
				expect(controlRates(state)).toEqual(controlRates(fold(log)));
			}),
			runs(300)
		);
	});
});

describe('two devices', () => {
	it('give the same verdicts, and the same contested trials, however their entries come between each other', () => {
		fc.assert(
			fc.property(arbitraryTwoDevices, fc.infiniteStream(fc.boolean()), ([first, second], random) => {
				const mixed: LogEvent[] = [];
				const [a, b] = [[...first], [...second]];
				while (a.length + b.length > 0) {
					const from = b.length === 0 || (a.length > 0 && random.next().value) ? a : b;
					mixed.push(from.shift()!);
				}
				const oneAfterTheOther = fold(received([...first, ...second]));
				const asMixed = fold(received(mixed));
				expect(results(asMixed)).toEqual(results(oneAfterTheOther));
				expect(contested(asMixed)).toEqual(contested(oneAfterTheOther));
				expect(asMixed.trials.size).toBe(readLog(mixed).presentations.length);
			}),
			runs(500)
		);
	});

	it('make a trial contested, and without a verdict, when both score it unknown to each other', () => {
		fc.assert(
			fc.property(arbitraryTwoDevices, ([first, second]) => {
				const state = fold(received([...first, ...second]));
				const scoredBy = (entries: LogEvent[], trial: string) =>
					standingEntries(received(entries)).some((e) => e.type === 'trial-scored' && e.data.trial === trial);
				for (const [id, trial] of state.trials) {
					if (!scoredBy(first, id) || !scoredBy(second, id)) continue;
					expect(trial).toMatchObject({ contested: true, effect: { language: 'pending', 'speech-motor': 'pending' } });
				}
				expect(state.unknown).toEqual([]);
			}),
			runs(300)
		);
	});
});
