import type { Effect } from './vocabulary';

/**
 * The rule of a protocol: at least `minTrials` valid trials, of which at least `share` (a fraction as two whole
 * numbers) were disturbed. The default is two of three: Walker et al., Neurosurgery 2004 (anomia in at least two
 * thirds of the stimulations of a site), with at least three stimulations per site.
 */
export interface Rule {
	minTrials: number;
	share: [number, number];
}

export const DEFAULT_RULE: Readonly<Rule> = Object.freeze({ minTrials: 3, share: [2, 3] as [number, number] });

export type Verdict = 'untested' | 'open' | 'positive' | 'negative';

export interface SiteVerdict {
	verdict: Verdict;
	/** valid trials that were disturbed */
	disturbed: number;
	/** trials that count */
	valid: number;
	/** trials that do not count */
	excluded: number;
	/** only while open: the result, when the trials still to do cannot change it */
	settled: 'positive' | 'negative' | null;
	/** trials still to do before there is a result */
	remaining: number;
}

/**
 * The result of one site for one task, language and class, in whole numbers so that two thirds is exact.
 *
 * @param effects what each trial says, in any order
 */
export function verdict(effects: readonly Effect[], rule: Readonly<Rule> = DEFAULT_RULE): SiteVerdict {
	let disturbed = 0;
	let valid = 0;
	for (const effect of effects) {
		if (effect === 'excluded') continue;
		valid++;
		if (effect === 'disturbed') disturbed++;
	}
	return { ...judge(disturbed, valid, rule), disturbed, valid, excluded: effects.length - valid };
}

function judge(disturbed: number, valid: number, rule: Readonly<Rule>) {
	const remaining = Math.max(0, rule.minTrials - valid);
	if (valid === 0) return { verdict: 'untested', settled: null, remaining } as const;
	if (remaining === 0) {
		return { verdict: reaches(disturbed, valid, rule) ? 'positive' : 'negative', settled: null, remaining } as const;
	}
	return { verdict: 'open', settled: settled(disturbed, rule, remaining), remaining } as const;
}

function reaches(disturbed: number, valid: number, { share: [part, whole] }: Readonly<Rule>): boolean {
	return whole * disturbed >= part * valid;
}

function settled(disturbed: number, rule: Readonly<Rule>, remaining: number): 'positive' | 'negative' | null {
	if (reaches(disturbed, rule.minTrials, rule)) return 'positive';
	if (!reaches(disturbed + remaining, rule.minTrials, rule)) return 'negative';
	return null;
}
