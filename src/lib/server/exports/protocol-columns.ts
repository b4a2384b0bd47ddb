import type { Protocol } from '../../mapping/protocol';
import type { Cell } from './csv';

/** The part of a protocol that verdicts depend on, as every row of an export carries it. */
export const PROTOCOL_COLUMNS = [
	'rule_min_trials',
	'rule_share_part',
	'rule_share_whole',
	'later',
	'effects',
	'required'
] as const;

export type ProtocolColumn = (typeof PROTOCOL_COLUMNS)[number];

/** The share stands as two whole numbers: a spreadsheet would take 2/3 for a date. */
export function protocolCells({ rule, later, effects, required }: Protocol): Record<ProtocolColumn, Cell> {
	return {
		rule_min_trials: rule.minTrials,
		rule_share_part: rule.share[0],
		rule_share_whole: rule.share[1],
		later,
		effects: JSON.stringify(effects),
		required: JSON.stringify(required)
	};
}
