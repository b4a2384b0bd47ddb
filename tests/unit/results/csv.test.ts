import { parse } from 'csv-parse/sync';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readCsv, writeCsv, type Cell } from '../../../src/lib/server/exports/csv';
import { readStrictly } from './strict-csv';

const COLUMNS = ['first', 'second', 'third'] as const;

function table(rows: Cell[][]): string {
	return writeCsv(
		COLUMNS,
		rows.map(([first = null, second = null, third = null]) => ({ first, second, third }))
	);
}

/** Text made of what breaks tables: separators, quotes, line ends, what begins a formula, and other scripts. */
const hostile = fc
	.array(
		fc.constantFrom(
			'=',
			'+',
			'-',
			'@',
			'\t',
			'\r',
			'\n',
			'\0',
			"'",
			'"',
			',',
			';',
			' ',
			'0',
			'a',
			'ü',
			'猫',
			'🧠',
			'\ufeff'
		),
		{ maxLength: 8 }
	)
	.map((parts) => parts.join(''));
const rows = fc.array(fc.tuple(hostile, hostile, hostile), { minLength: 1, maxLength: 5 });

/** OWASP ASVS 5.0, 1.2.10: `=`, `+`, `-`, `@`, tab and NUL; a spreadsheet skips a carriage return. */
const BEGINS_FORMULA = /^[=+\-@\t\r\0]/;

describe('a table written as CSV', () => {
	it('is read alike by a strict reader of RFC 4180 and by csv-parse', () => {
		fc.assert(
			fc.property(rows, (given) => {
				const text = table(given);
				const strictly = readStrictly(text);
				expect(parse(text, { record_delimiter: '\r\n' })).toEqual(strictly);
				expect(strictly).toHaveLength(given.length + 1);
			}),
			{ numRuns: 1000 }
		);
	});

	it('has no cell that begins a formula, and gives back every cell as it was', () => {
		fc.assert(
			fc.property(rows, (given) => {
				const text = table(given);
				for (const cell of readStrictly(text).flat()) expect(cell).not.toMatch(BEGINS_FORMULA);
				expect(readCsv(text)).toEqual({ columns: [...COLUMNS], rows: given });
			}),
			{ numRuns: 1000 }
		);
	});

	it('guards text alone and leaves numbers, and an apostrophe that guards nothing, as they are', () => {
		expect(table([['=1+1', -1.5, "'tis"]])).toBe("first,second,third\r\n'=1+1,-1.5,'tis\r\n");
		expect(table([["'=1+1", '-1.5', null]])).toBe("first,second,third\r\n''=1+1,'-1.5,\r\n");
		expect(table([['@sum', true, '\tx']])).toBe("first,second,third\r\n'@sum,true,'\tx\r\n");
	});

	// The examples of RFC 4180, section 2, rules 6 and 7.
	it('quotes a cell for a line end, a comma or a quote in it', () => {
		expect(table([['aaa', 'b\r\nbb', 'ccc']])).toBe('first,second,third\r\naaa,"b\r\nbb",ccc\r\n');
		expect(table([['aaa', 'b"bb', 'ccc']])).toBe('first,second,third\r\naaa,"b""bb",ccc\r\n');
		expect(table([['a\nb', 'c\rd', 'e,f']])).toBe('first,second,third\r\n"a\nb","c\rd","e,f"\r\n');
	});

	it('is read when a spreadsheet has put a byte order mark and other line ends into it', () => {
		expect(readCsv('\ufefffirst,second\nä,"b"\n')).toEqual({ columns: ['first', 'second'], rows: [['ä', 'b']] });
	});
});
