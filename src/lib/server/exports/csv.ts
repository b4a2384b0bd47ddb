import { parse } from 'csv-parse/sync';
import { stringify } from 'csv-stringify/sync';
import { guarded, unguarded } from './formula-guard';

/** What a cell may hold; null is an empty cell. */
export type Cell = string | number | boolean | null;

/**
 * A table as RFC 4180 writes it: a header, CRLF after every row, quotes where a cell needs them. Text that a
 * spreadsheet would take for a formula is guarded; numbers stand as they are.
 */
export function writeCsv<Column extends string>(
	columns: readonly Column[],
	rows: readonly Record<Column, Cell>[]
): string {
	const table = [columns, ...rows.map((row) => columns.map((column) => textOf(row[column])))];
	// The package quotes a cell for the whole record delimiter alone; RFC 4180 asks it of CR and of LF each.
	return stringify(table, { record_delimiter: '\r\n', quoted_match: /[\r\n]/ });
}

function textOf(cell: Cell): string {
	if (cell === null) return '';
	return typeof cell === 'string' ? guarded(cell) : String(cell);
}

/**
 * The rows of a table with a header, guards taken off. A byte order mark and other line ends are read too, as
 * spreadsheets write them.
 *
 * @throws Error when the rows are not all as long as the header, or a quote is never closed
 */
export function readCsv(text: string): { columns: string[]; rows: string[][] } {
	const [columns = [], ...rows] = parse(text, { bom: true, skip_empty_lines: true }) as string[][];
	return { columns, rows: rows.map((row) => row.map(unguarded)) };
}
