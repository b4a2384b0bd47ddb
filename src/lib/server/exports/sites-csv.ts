import type { CaseState } from '../../mapping/case-state';
import { siteAdvice, type AdjustedP, type SiteAdvice } from '../../mapping/site-advice';
import { tagResults } from '../../mapping/sites';
import { CLASSES, type ResponseClass } from '../../mapping/vocabulary';
import { writeCsv, type Cell } from './csv';
import { PROTOCOL_COLUMNS, protocolCells } from './protocol-columns';

/** The columns of sites.csv in their order; the README says what each holds. */
const SITE_COLUMNS = [
	'case',
	'class',
	'tag',
	'tag_kind',
	'tag_result',
	'task',
	'language',
	'verdict',
	'disturbed',
	'valid',
	'excluded',
	'pending',
	'settled',
	'remaining',
	'kinds',
	'milliamps_lowest',
	'milliamps_highest',
	'share_low',
	'share_high',
	'control_disturbed',
	'control_valid',
	'binomial_p',
	'binomial_holm',
	'binomial_bh',
	'fisher_p',
	'fisher_holm',
	'fisher_bh',
	...PROTOCOL_COLUMNS
] as const;

type SiteColumn = (typeof SITE_COLUMNS)[number];

/** Every row of the map for both classes, with its statistics as advice and the protocol in force. */
export function sitesCsv(code: string, state: CaseState): string {
	const tags = new Map(tagResults(state).map((result) => [result.tag, result]));
	const protocol = protocolCells(state.protocol);
	const rows = CLASSES.flatMap((asked) =>
		siteAdvice(state, asked).map((advice): Record<SiteColumn, Cell> => ({
			case: code,
			...result(asked, advice),
			tag_kind: tags.get(advice.row.tag)?.kind ?? null,
			tag_result: tags.get(advice.row.tag)?.result ?? null,
			...statistics(advice),
			...protocol
		}))
	);
	return writeCsv(SITE_COLUMNS, rows);
}

function result(asked: ResponseClass, { row }: SiteAdvice) {
	return {
		class: asked,
		tag: row.tag,
		task: row.task,
		language: row.language,
		verdict: row.verdict,
		disturbed: row.disturbed,
		valid: row.valid,
		excluded: row.excluded,
		pending: row.trials.length - row.valid - row.excluded,
		settled: row.settled,
		remaining: row.remaining,
		kinds: Object.entries(row.kinds)
			.map(([kind, count]) => `${kind} ${count}`)
			.join('; '),
		milliamps_lowest: row.milliamps?.[0] ?? null,
		milliamps_highest: row.milliamps?.[1] ?? null
	};
}

function statistics({ interval, controls, binomial, fisher }: SiteAdvice) {
	const [binomial_p, binomial_holm, binomial_bh] = valuesOf(binomial);
	const [fisher_p, fisher_holm, fisher_bh] = valuesOf(fisher);
	return {
		share_low: interval?.[0] ?? null,
		share_high: interval?.[1] ?? null,
		control_disturbed: controls.disturbed,
		control_valid: controls.valid,
		binomial_p,
		binomial_holm,
		binomial_bh,
		fisher_p,
		fisher_holm,
		fisher_bh
	};
}

function valuesOf(advice: AdjustedP | null): [Cell, Cell, Cell] {
	return advice ? [advice.p, advice.holm, advice.benjaminiHochberg] : [null, null, null];
}
