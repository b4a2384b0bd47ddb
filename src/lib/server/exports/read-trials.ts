import { z } from 'zod';
import { PURPOSES, SCORES, TAG_PATTERN } from '../../mapping/vocabulary';
import { protocolFields } from '../log/event-schema';
import { readCsv } from './csv';
import { PROTOCOL_COLUMNS } from './protocol-columns';
import type { TrialColumn } from './trial-columns';

/** A file that is no export of trials, or not any more; the message says where and why. */
export class UnreadableExport extends Error {}

const empty = z.literal('').transform(() => null);
const yesOrNo = z
	.string()
	.toLowerCase()
	.pipe(z.enum(['true', 'false'], 'is neither true nor false'))
	.transform((text) => text === 'true');
const words = z.string().transform((text) => text.split(' ').filter((word) => word !== ''));
const score = z.enum(SCORES, 'is not a score');
const movement = z.enum(['kept', 'lost'], 'is neither kept nor lost').or(empty);
const count = z
	.string()
	.regex(/^[1-9]\d*$/, 'is not a whole number of at least 1')
	.transform(Number);
const json = z.string().transform((text, context): unknown => {
	try {
		return JSON.parse(text);
	} catch {
		context.addIssue({ code: 'custom', message: 'is not as it was written' });
		return z.NEVER;
	}
});

/** The cells a verdict depends on; whatever else stands in the file is not looked at. */
const cells = {
	case: z.string().min(1, 'is empty'),
	trial: z.string().min(1, 'is empty'),
	purpose: z.enum(PURPOSES, 'is not a purpose').or(empty),
	tag: z.string().regex(TAG_PATTERN, 'is not a tag').or(empty),
	stimulated: yesOrNo,
	task: z.string().min(1, 'is empty'),
	language: z.string().min(1, 'is empty'),
	item: z.string().min(1).or(empty),
	score: score.or(empty),
	also: words.pipe(z.array(score)),
	when: z.enum(['during', 'within-4s', 'later'], 'is not a time of an error').or(empty),
	movement_tongue: movement,
	movement_hand: movement,
	contested: yesOrNo,
	shown: yesOrNo.or(empty),
	excluded: z.string(),
	effect_language: z.enum(['disturbed', 'intact', 'excluded', 'pending'], 'is not an effect'),
	rule_min_trials: count,
	rule_share_part: count,
	rule_share_whole: count,
	later: protocolFields.later,
	effects: json.pipe(protocolFields.effects),
	required: json.pipe(protocolFields.required)
} satisfies Partial<Record<TrialColumn, z.ZodType>>;

const row = z.object(cells).refine(({ rule_share_part: part, rule_share_whole: whole }) => part <= whole, {
	path: ['rule_share_part'],
	message: 'is more than rule_share_whole'
});

/** One trial of the file; `line` is its row as a spreadsheet counts, the header being row 1. */
export type TrialRow = z.infer<typeof row> & { line: number };

/**
 * Reads an exported file of trials.
 *
 * @throws UnreadableExport when it is none, when a cell is not as it was exported, or when its rows are not of one
 *   case under one protocol
 */
export function readTrials(text: string): TrialRow[] {
	const { columns, rows } = parsed(text);
	const missing = Object.keys(cells).filter((name) => !columns.includes(name));
	if (missing.length > 0) throw new UnreadableExport(missingText(columns, missing));
	const trials = rows.map((values, index) => readRow(columns, values, index + 2));
	requireOneCase(trials);
	requireEachTrialOnce(trials);
	return trials;
}

function parsed(text: string): { columns: string[]; rows: string[][] } {
	try {
		return readCsv(text);
	} catch (failure) {
		throw new UnreadableExport(`it is not a table as it was exported: ${(failure as Error).message}`);
	}
}

function missingText(columns: string[], missing: string[]): string {
	const separator = columns.length === 1 && /[;\t]/.test(columns[0] ?? '');
	if (separator) return 'its columns are not parted by commas; save it as CSV with commas';
	return `it is not an export of trials, or columns were taken out of it: there is no ${missing.join(', ')}`;
}

function readRow(columns: string[], values: string[], line: number): TrialRow {
	const given = Object.fromEntries(columns.map((name, index) => [name, values[index]]));
	const result = row.safeParse(given);
	if (result.success) return { ...result.data, line };
	const [issue] = result.error.issues;
	const column = String(issue?.path[0] ?? '');
	throw new UnreadableExport(`row ${line}, ${column}: "${given[column] ?? ''}" ${reasonOf(issue)}`);
}

/** Of a cell that may be empty or one of several, what the several say. */
function reasonOf(issue: z.core.$ZodIssue | undefined): string {
	if (issue?.code === 'invalid_union') return reasonOf(issue.errors[0]?.[0]);
	return issue?.message ?? 'is not as it was written';
}

const SAME_IN_EVERY_ROW = ['case', ...PROTOCOL_COLUMNS] as const;

function requireOneCase(trials: readonly TrialRow[]): void {
	const [first] = trials;
	if (!first) return;
	for (const trial of trials) {
		const other = SAME_IN_EVERY_ROW.find((name) => JSON.stringify(trial[name]) !== JSON.stringify(first[name]));
		if (other === undefined) continue;
		throw new UnreadableExport(`row ${trial.line}, ${other}: differs from row ${first.line}; one file is of one case`);
	}
}

function requireEachTrialOnce(trials: readonly TrialRow[]): void {
	const lines = new Map<string, number>();
	for (const { trial, line } of trials) {
		const before = lines.get(trial);
		if (before !== undefined) throw new UnreadableExport(`row ${line}: the trial of row ${before} again`);
		lines.set(trial, line);
	}
}
