/**
 * Reads a file by the grammar of RFC 4180, section 2, and nothing looser: CRLF after every record, a quote only around
 * a whole field or doubled inside one, every record as long as the first.
 *
 * @throws SyntaxError at the first character that the grammar does not allow
 */
export function readStrictly(text: string): string[][] {
	const records: string[][] = [];
	let place = 0;
	while (place < text.length) {
		const record: string[] = [];
		for (;;) {
			const field = text[place] === '"' ? quoted(text, place) : bare(text, place);
			record.push(field.value);
			place = field.end;
			if (text[place] !== ',') break;
			place++;
		}
		if (text.slice(place, place + 2) !== '\r\n') throw new SyntaxError(`no CRLF at ${place}`);
		place += 2;
		records.push(record);
		if (record.length !== records[0]?.length) throw new SyntaxError(`record ${records.length} is of another length`);
	}
	return records;
}

function quoted(text: string, start: number): { value: string; end: number } {
	let value = '';
	let place = start + 1;
	for (;;) {
		const close = text.indexOf('"', place);
		if (close === -1) throw new SyntaxError(`the quote at ${start} is not closed`);
		value += text.slice(place, close);
		if (text[close + 1] !== '"') return { value, end: close + 1 };
		value += '"';
		place = close + 2;
	}
}

function bare(text: string, start: number): { value: string; end: number } {
	const [value] = /^[^",\r\n]*/.exec(text.slice(start)) ?? [''];
	return { value, end: start + value.length };
}
