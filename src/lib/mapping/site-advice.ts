import type { CaseState, Row } from './case-state';
import { controlRates } from './controls';
import { sites } from './sites';
import { benjaminiHochberg } from './statistics/benjamini-hochberg';
import { binomialTail } from './statistics/binomial-tail';
import { fisherExact } from './statistics/fisher-exact';
import { holm } from './statistics/holm';
import { wilson } from './statistics/wilson';
import type { ResponseClass } from './vocabulary';

/** A p value, alone and adjusted for all rows of the class that have one. */
export interface AdjustedP {
	p: number;
	holm: number;
	benjaminiHochberg: number;
}

/** What statistics say of a row of the map. It stands beside the verdict and never overrules it. */
export interface SiteAdvice {
	row: Row;
	/** Wilson's 95 % interval of the share of disturbed trials; null without a valid trial */
	interval: [low: number, high: number] | null;
	/** the patient's errors without stimulation, same task and language */
	controls: { disturbed: number; valid: number };
	/** chance of as many disturbed trials or more at the error rate of the controls; null without trials or controls */
	binomial: AdjustedP | null;
	/** Fisher's exact test, more disturbed with stimulation than in the controls; null without trials or controls */
	fisher: AdjustedP | null;
}

/** Advice for every row of a class, in the order of the map. */
export function siteAdvice(state: CaseState, asked: ResponseClass = 'language'): SiteAdvice[] {
	const rates = controlRates(state, asked);
	const rows = sites(state, asked).map((row) => {
		const rate = rates.find(({ task, language }) => task === row.task && language === row.language);
		return { row, controls: { disturbed: rate?.disturbed ?? 0, valid: rate?.valid ?? 0 } };
	});
	const binomial = adjusted(rows.map(({ row, controls }) => comparable(row, controls, tail)));
	const fisher = adjusted(rows.map(({ row, controls }) => comparable(row, controls, exact)));
	return rows.map(({ row, controls }, index) => ({
		row,
		interval: row.valid > 0 ? wilson(row.disturbed, row.valid) : null,
		controls,
		binomial: binomial[index] ?? null,
		fisher: fisher[index] ?? null
	}));
}

interface Counts {
	disturbed: number;
	valid: number;
}

function comparable(site: Counts, controls: Counts, test: (site: Counts, controls: Counts) => number): number | null {
	return site.valid > 0 && controls.valid > 0 ? test(site, controls) : null;
}

function tail(site: Counts, controls: Counts): number {
	return binomialTail(site.disturbed, site.valid, controls.disturbed / controls.valid);
}

function exact(site: Counts, controls: Counts): number {
	return fisherExact([split(site), split(controls)], 'greater');
}

function split({ disturbed, valid }: Counts): [number, number] {
	return [disturbed, valid - disturbed];
}

/** Adjusts the values that are there for one another, each in its place. */
function adjusted(ps: readonly (number | null)[]): (AdjustedP | null)[] {
	const found = ps.filter((p) => p !== null);
	const [byHolm, byRate] = [holm(found), benjaminiHochberg(found)];
	let next = 0;
	return ps.map((p) => {
		if (p === null) return null;
		const place = next++;
		return { p, holm: byHolm[place] as number, benjaminiHochberg: byRate[place] as number };
	});
}
