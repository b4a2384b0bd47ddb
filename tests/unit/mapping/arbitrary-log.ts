/**
 * Logs of a case over small pools, so that entries meet: few trials, tags, runs and pauses, entries that name others
 * before and after them in the log, or that never come.
 */
import fc from 'fast-check';
import type { AnyCaseEvent, EventData, EventType, LogEvent } from '../../../src/lib/mapping/events';
import {
	EFFECTS,
	ERROR_KINDS,
	PURPOSES,
	SCORES,
	type ErrorKind,
	type Score
} from '../../../src/lib/mapping/vocabulary';
import { received, time } from './entry';

/** What an entry says, with the entries it names still given as numbers. */
type Draft = { [T in EventType]: { type: T; data: EventData[T]; names: number[] } }[EventType];

function draft<T extends EventType>(type: T, data: fc.Arbitrary<EventData[T]>): fc.Arbitrary<Draft> {
	return data.map((value) => ({ type, data: value, names: [] as number[] }) as unknown as Draft);
}

/** An optional field: there, or not there at all. */
function record<T>(
	required: { [K in keyof T]?: fc.Arbitrary<T[K]> },
	optional: { [K in keyof T]?: fc.Arbitrary<T[K]> } = {}
) {
	return fc.record({ ...required, ...optional } as { [K in keyof T]: fc.Arbitrary<T[K]> }, {
		requiredKeys: Object.keys(required) as (keyof T)[]
	}) as fc.Arbitrary<T>;
}

const often = <T>(usual: T, ...others: T[]) =>
	fc.oneof({ weight: 10, arbitrary: fc.constant(usual) }, { weight: 2, arbitrary: fc.constantFrom(usual, ...others) });

const trial = fc.nat(11).map((number) => `trial-${number + 1}`);
const tag = often('7', '7B', '12', 'A');
const tagOrNone = often<string | null>('7', '7B', '12', null);
const task = often('object-naming', 'counting');
const language = often('en', 'de-DE');
const item = often<string | null>('house', 'tree', null);
const milliamps = fc.constantFrom(1.5, 2, 2.5, 4, null);
const run = fc.constantFrom('run-1', 'run-2');
const pause = fc.constantFrom('pause-1', 'pause-2');
const score = fc.oneof(
	{
		weight: 8,
		arbitrary: fc.constantFrom('intact' as const, 'anomia' as const, 'anomia' as const, 'dysarthria' as const)
	},
	{ weight: 3, arbitrary: fc.constantFrom(...SCORES) }
);
const kept = fc.constantFrom('kept' as const, 'lost' as const);
const effects = fc.dictionary(
	fc.constantFrom(
		'anomia',
		'delay',
		'dysarthria',
		'speech-arrest',
		'seizure',
		...ERROR_KINDS
	) as fc.Arbitrary<ErrorKind>,
	record({}, { language: fc.constantFrom(...EFFECTS), 'speech-motor': fc.constantFrom(...EFFECTS) }),
	{ maxKeys: 4 }
) as fc.Arbitrary<EventData['protocol-set']['effects']>;

/** Everything the rows, the verdicts and the tags depend on, entry-withdrawn apart. */
const plain: fc.WeightedArbitrary<Draft>[] = [
	{
		weight: 12,
		arbitrary: draft(
			'trial-presented',
			record<EventData['trial-presented']>(
				{ trial, item, task, language, tag: tagOrNone, stimulated: often(true, false), milliamps },
				{ run: fc.oneof(fc.constant(undefined), run) as fc.Arbitrary<string> }
			).map((data) => JSON.parse(JSON.stringify(data)))
		)
	},
	{
		weight: 10,
		arbitrary: fc
			.tuple(
				record<EventData['trial-scored']>(
					{ trial, score, corrects: fc.constant([]) },
					{
						also: fc.oneof({ weight: 3, arbitrary: fc.constant<Score[]>([]) }, fc.array(score, { maxLength: 2 })),
						when: often<'during' | 'within-4s' | 'later'>('during', 'within-4s', 'later'),
						movement: fc.oneof({ weight: 8, arbitrary: fc.constant({}) }, record({}, { tongue: kept, hand: kept }))
					}
				),
				fc.oneof({ weight: 5, arbitrary: fc.constant([]) }, fc.array(fc.nat(59), { minLength: 1, maxLength: 2 }))
			)
			.map(([data, names]) => ({ type: 'trial-scored' as const, data, names }))
	},
	{
		weight: 1,
		arbitrary: draft(
			'tag-placed',
			record<EventData['tag-placed']>({ tag }, { kind: fc.constantFrom('cortical', 'subcortical') })
		)
	},
	{ weight: 1, arbitrary: draft('tag-removed', record({ tag })) },
	{
		weight: 1,
		arbitrary: draft(
			'protocol-set',
			record<EventData['protocol-set']>(
				{},
				{
					rule: fc.record({
						minTrials: fc.integer({ min: 1, max: 4 }),
						share: fc.constantFrom<[number, number]>([2, 3], [1, 2], [1, 1], [1, 3])
					}),
					effects,
					later: fc.constantFrom('excluded', 'counted'),
					required: fc.array(fc.record({ task, language }), { maxLength: 2 }).map(distinct)
				}
			)
		)
	},
	{ weight: 1, arbitrary: draft('run-opened', record({ run, purpose: often('mapping', ...PURPOSES) })) },
	{ weight: 0.5, arbitrary: draft('run-closed', record({ run })) },
	{ weight: 1, arbitrary: draft('trial-onset', record({ trial, shown: fc.boolean() })) },
	{
		weight: 2,
		arbitrary: draft(
			'trial-corrected',
			record<EventData['trial-corrected']>(
				{ trial },
				{ tag: tagOrNone, stimulated: fc.boolean(), milliamps, item, task, language }
			)
		)
	},
	{ weight: 0.5, arbitrary: draft('trial-excluded', record({ trial, reason: fc.constant('seen by somebody else') })) },
	{ weight: 0.25, arbitrary: draft('pause-opened', record({ pause, reason: fc.constant('rest') })) },
	{ weight: 0.25, arbitrary: draft('pause-closed', record({ pause })) },
	{
		weight: 1,
		arbitrary: draft(
			'stimulation-started',
			record<EventData['stimulation-started']>(
				{ stimulation: fc.constant('stimulation-1'), tag: tagOrNone, milliamps, source: fc.constant('foot switch') },
				{ trial }
			)
		)
	}
].map(({ weight, arbitrary }) => ({ weight: weight * 4, arbitrary: arbitrary as fc.Arbitrary<Draft> }));

/** A withdrawal, mostly of one of the few entries before it, so that withdrawals of withdrawals come about. */
const withdrawal: fc.WeightedArbitrary<Draft> = {
	weight: 20,
	arbitrary: fc
		.nat(59)
		.map((name) => ({ type: 'entry-withdrawn' as const, data: { entry: '' }, names: [name] }) as unknown as Draft)
};

function distinct<T>(values: T[]): T[] {
	return values.filter(
		(value, index) => values.findIndex((o) => JSON.stringify(o) === JSON.stringify(value)) === index
	);
}

const moment = fc.record({
	seconds: fc.nat(9),
	offset: fc.constantFrom('Z' as const, '+02:00' as const, '-05:00' as const),
	/** the next presentation makes the next trial, and the next score goes to the next trial */
	inTurn: fc.nat(9).map((number) => number > 0)
});
type Moment = typeof moment extends fc.Arbitrary<infer T> ? T : never;

/** Gives the drafts their ids and the ids of what they name: scores for a score, any entry for a withdrawal. */
function written(drafts: readonly [Draft, Moment][]): LogEvent[] {
	const idOf = (index: number) => `entry-${index}`;
	const scores = drafts.flatMap(([{ type }], index) => (type === 'trial-scored' ? [index] : []));
	const turns = { 'trial-presented': 0, 'trial-scored': 0 };
	return drafts.map(([{ type, data, names }, { seconds, offset, inTurn }], index) => {
		const base = { id: idOf(index), type, at: time(seconds, offset), device: 'examiner', monotonic: index };
		if (type === 'entry-withdrawn') {
			const [name = 0] = names;
			// Four of six name one of the ten entries before them; the others any entry, of later position too.
			const target = name % 6 < 4 ? Math.max(0, index - 1 - (name % 10)) : name % drafts.length;
			return { ...base, data: { entry: idOf(target) } } as AnyCaseEvent;
		}
		if (type !== 'trial-presented' && type !== 'trial-scored') return { ...base, data } as AnyCaseEvent;
		const turn = inTurn ? { trial: `trial-${++turns[type]}` } : {};
		if (type === 'trial-presented') return { ...base, data: { ...data, ...turn } } as AnyCaseEvent;
		const corrects = names.map((name) => idOf(scores[name % scores.length] ?? 0));
		return { ...base, data: { ...data, ...turn, corrects } } as AnyCaseEvent;
	});
}

/** Any length up to 60; most are long, as it takes many entries to make three valid trials at one tag. */
function log(kinds: fc.WeightedArbitrary<Draft>[]): fc.Arbitrary<LogEvent[]> {
	const one = fc.tuple(fc.oneof(...kinds), moment);
	return fc
		.oneof(
			{ weight: 1, arbitrary: fc.array(one, { maxLength: 60, size: 'max' }) },
			{ weight: 2, arbitrary: fc.array(one, { minLength: 45, maxLength: 60, size: 'max' }) }
		)
		.map((drafts) => received(written(drafts)));
}

/** A log of up to 60 entries, each once, with positions. */
export const arbitraryLog: fc.Arbitrary<LogEvent[]> = log([...plain, withdrawal]);

/** A log in which nothing is taken back. */
export const arbitraryLogWithoutWithdrawals: fc.Arbitrary<LogEvent[]> = log(plain);

/** A log with some of its entries again, later than they came first. */
export const arbitraryLogWithResends: fc.Arbitrary<LogEvent[]> = fc
	.tuple(arbitraryLog, fc.array(fc.tuple(fc.nat(59), fc.nat(59)), { maxLength: 10 }))
	.map(([entries, again]) => withResends(entries, again));

function withResends(entries: readonly LogEvent[], again: readonly (readonly [number, number])[]): LogEvent[] {
	const result = [...entries];
	for (const [which, later] of again) {
		const sent = entries[which % entries.length];
		if (!sent) continue;
		const place = result.findIndex((event) => event.id === sent.id) + 1 + later;
		result.splice(place, 0, structuredClone(sent));
	}
	return result;
}

/** What two devices do, each in its own order: they present trials of their own and score each other's too. */
export const arbitraryTwoDevices: fc.Arbitrary<[LogEvent[], LogEvent[]]> = fc.tuple(
	deviceEntries('examiner', ['trial-1', 'trial-2', 'trial-3']),
	deviceEntries('neurophysiologist', ['trial-4', 'trial-5', 'trial-6'])
);

function deviceEntries(device: string, own: string[]): fc.Arbitrary<LogEvent[]> {
	const anyTrial = fc.nat(5).map((number) => `trial-${number + 1}`);
	const ownTrial = fc.constantFrom(...own);
	const action = fc.oneof(
		{
			weight: 4,
			arbitrary: record<EventData['trial-presented']>({
				trial: ownTrial,
				item,
				task: fc.constant('object-naming'),
				language: fc.constant('en'),
				tag: often<string | null>('7', '12'),
				stimulated: often(true, false),
				milliamps
			}).map((data) => ({ type: 'trial-presented' as const, data, back: 0 }))
		},
		{
			weight: 6,
			arbitrary: fc.record({ trial: anyTrial, score, back: fc.nat(4) }).map(({ back, ...data }) => ({
				type: 'trial-scored' as const,
				data: { ...data, corrects: [] as string[] },
				back
			}))
		},
		{
			weight: 1,
			arbitrary: record<EventData['trial-corrected']>({ trial: ownTrial, tag: often<string | null>('7', '12') }).map(
				(data) => ({ type: 'trial-corrected' as const, data, back: 0 })
			)
		},
		{
			weight: 1,
			arbitrary: fc.nat(5).map((back) => ({ type: 'entry-withdrawn' as const, data: { entry: '' }, back }))
		}
	);
	return fc.array(action, { maxLength: 20, size: 'max' }).map((actions) =>
		actions.map(({ type, data, back }, index) => {
			const id = `${device}-${index}`;
			const base = { id, type, at: time(index), device, monotonic: index };
			const named = `${device}-${Math.max(0, index - back)}`;
			if (type === 'entry-withdrawn') return { ...base, data: { entry: named } } as AnyCaseEvent;
			// Now and then a device replaces a score of its own; those of the other it does not know.
			const earlier = actions.findLastIndex(
				(other, place) =>
					place < index && other.type === 'trial-scored' && other.data.trial === (data as { trial: string }).trial
			);
			if (type === 'trial-scored' && back > 1 && earlier >= 0) {
				return { ...base, data: { ...data, corrects: [`${device}-${earlier}`] } } as AnyCaseEvent;
			}
			return { ...base, data } as AnyCaseEvent;
		})
	);
}
