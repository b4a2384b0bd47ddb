import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { DEFAULT_RULE, verdict, type Rule } from '$lib/mapping/verdict';
import { EFFECTS, type Effect } from '$lib/mapping/vocabulary';

/**
 * The sign of a/b - c/d by the continued fractions of both: whole parts first, then the remainders turned over.
 * Exact, and another way than multiplying across.
 */
function compare(a: bigint, b: bigint, c: bigint, d: bigint): -1 | 0 | 1 {
	const [one, other] = [a / b, c / d];
	if (one !== other) return one < other ? -1 : 1;
	const [left, right] = [a % b, c % d];
	if (left === 0n || right === 0n) return left === right ? 0 : left === 0n ? -1 : 1;
	return compare(d, right, b, left);
}

/** The result of `disturbed` in `valid`, by the words of the rule. */
function resultOf(disturbed: number, valid: number, { minTrials, share: [part, whole] }: Rule) {
	if (valid === 0) return 'untested';
	if (valid < minTrials) return 'open';
	const reached = compare(BigInt(disturbed), BigInt(valid), BigInt(part), BigInt(whole)) >= 0;
	return reached ? 'positive' : 'negative';
}

/** Every way `count` valid trials can go. */
function continuations(count: number): Effect[][] {
	return Array.from({ length: 2 ** count }, (_, bits) =>
		Array.from({ length: count }, (_, place) => ((bits >> place) & 1 ? 'disturbed' : 'intact'))
	);
}

function disturbedIn(effects: readonly Effect[]): number {
	return effects.filter((effect) => effect === 'disturbed').length;
}

const share = fc
	.tuple(fc.nat(60), fc.integer({ min: 1, max: 60 }))
	.map(([one, other]): [number, number] => [Math.min(one, other), Math.max(one, other)]);
const rule: fc.Arbitrary<Rule> = fc.record({ minTrials: fc.integer({ min: 1, max: 12 }), share });
const effects = fc.array(fc.constantFrom<Effect>(...EFFECTS), { maxLength: 16 });

describe('verdict', () => {
	it('is the result of the rule in exact fractions, and counts every trial once', () => {
		fc.assert(
			fc.property(effects, rule, (trials, rule) => {
				const found = verdict(trials, rule);
				const valid = trials.filter((effect) => effect !== 'excluded').length;
				expect(found).toMatchObject({ disturbed: disturbedIn(trials), valid, excluded: trials.length - valid });
				expect(found.verdict).toBe(resultOf(found.disturbed, valid, rule));
			}),
			{ numRuns: 1000 }
		);
	});

	it('is exact where the share is met to the trial, and one trial short of it', () => {
		fc.assert(
			fc.property(
				fc.integer({ min: 1, max: 12 }),
				share,
				fc.integer({ min: 1, max: 5 }),
				(minTrials, [a, b], times) => {
					fc.pre(a > 0 && b * times >= minTrials);
					const trials = (k: number) =>
						Array.from({ length: b * times }, (_, index): Effect => (index < k ? 'disturbed' : 'intact'));
					const rule: Rule = { minTrials, share: [a, b] };
					expect(verdict(trials(a * times), rule).verdict).toBe('positive');
					expect(verdict(trials(a * times - 1), rule).verdict).toBe('negative');
				}
			)
		);
	});

	it('tells a share that is met from one that lies a hair above', () => {
		const hair = fc.integer({ min: 1, max: 1e12 });
		fc.assert(
			fc.property(fc.integer({ min: 1, max: 12 }), fc.nat(11), hair, (n, below, times) => {
				const k = below % n;
				const trials = Array.from({ length: n }, (_, index): Effect => (index < k ? 'disturbed' : 'intact'));
				expect(verdict(trials, { minTrials: n, share: [k * times, n * times] }).verdict).toBe('positive');
				expect(verdict(trials, { minTrials: n, share: [k * times + 1, n * times] }).verdict).toBe('negative');
			})
		);
	});

	it('says how many trials there are to do: fewer never give a result, so many always do', () => {
		fc.assert(
			fc.property(effects, rule, (trials, rule) => {
				const { remaining } = verdict(trials, rule);
				for (let more = 0; more <= remaining; more++) {
					const outcomes = (['disturbed', 'intact'] as const).map(
						(effect) => verdict([...trials, ...new Array<Effect>(more).fill(effect)], rule).verdict
					);
					for (const outcome of outcomes) expect(['positive', 'negative'].includes(outcome)).toBe(more === remaining);
				}
			})
		);
	});

	it('is settled just when no way the trials to do can go changes the result', () => {
		fc.assert(
			fc.property(effects, rule, (trials, rule) => {
				const { verdict: now, settled, remaining, disturbed, valid } = verdict(trials, rule);
				const ends = new Set<string>();
				for (const continuation of continuations(remaining)) {
					const end = resultOf(disturbed + disturbedIn(continuation), valid + remaining, rule);
					if (remaining <= 6) expect(verdict([...trials, ...continuation], rule).verdict).toBe(end);
					ends.add(end);
				}
				const [only] = ends;
				expect(settled).toBe(now === 'open' && ends.size === 1 ? only : null);
			}),
			{ numRuns: 300 }
		);
	});

	it('takes trials in any order', () => {
		const shuffled = effects.chain((trials) =>
			fc.tuple(fc.constant(trials), fc.shuffledSubarray(trials, { minLength: trials.length }))
		);
		fc.assert(
			fc.property(shuffled, rule, ([trials, other], rule) => {
				expect(verdict(other, rule)).toEqual(verdict(trials, rule));
			})
		);
	});

	it.each<[effects: Effect[], wanted: object]>([
		[[], { verdict: 'untested', disturbed: 0, valid: 0, excluded: 0, settled: null, remaining: 3 }],
		[['excluded'], { verdict: 'untested', disturbed: 0, valid: 0, excluded: 1, settled: null, remaining: 3 }],
		[['disturbed'], { verdict: 'open', disturbed: 1, valid: 1, excluded: 0, settled: null, remaining: 2 }],
		[
			['disturbed', 'disturbed'],
			{ verdict: 'open', disturbed: 2, valid: 2, excluded: 0, settled: 'positive', remaining: 1 }
		],
		[['intact', 'intact'], { verdict: 'open', disturbed: 0, valid: 2, excluded: 0, settled: 'negative', remaining: 1 }],
		[['intact', 'disturbed'], { verdict: 'open', disturbed: 1, valid: 2, excluded: 0, settled: null, remaining: 1 }]
	])('by default asks for two thirds of at least three: %j', (trials, wanted) => {
		expect(DEFAULT_RULE).toEqual({ minTrials: 3, share: [2, 3] });
		expect(verdict(trials)).toEqual(wanted);
	});
});
