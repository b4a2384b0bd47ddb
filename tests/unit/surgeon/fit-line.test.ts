import { describe, expect, it } from 'vitest';
import { fitLine, type Line } from '../../../src/lib/components/surgeon/fit-line';

/** Every letter is 10 wide. */
const room = (width: number) => ({ width, gap: 10, measure: ({ text }: { text: string }) => text.length * 10 });
const line = (texts: (string | [string, string])[], more?: Line['more']): Line => ({
	parts: texts.map((text) => ({
		tone: 'ink',
		...(typeof text === 'string' ? { text } : { text: text[0], short: text[1] })
	})),
	more
});
const shown = (given: Line, most: number, width: number) =>
	fitLine(given, most, room(width)).parts.map(({ text }) => text);

describe('words on a line', () => {
	it('all stand where they fit to the pixel', () => {
		expect(shown(line(['aaa', 'bbb']), 1, 70)).toEqual(['aaa', 'bbb']);
		expect(shown(line(['aaa', 'bbb']), 1, 69)).toEqual(['aaa']);
	});

	it('are shortened before any is left out', () => {
		expect(shown(line([['aaaaaa', 'aa'], 'bbb']), 1, 100)).toEqual(['aaaaaa', 'bbb']);
		expect(shown(line([['aaaaaa', 'aa'], 'bbb']), 1, 60)).toEqual(['aa', 'bbb']);
	});

	it('are left out from the end, and the line says how many', () => {
		const list = line(['a', 'b', 'c', 'd', 'e'], (left) => `+${left}`);
		expect(fitLine(list, 1, room(90)).left).toBe(0);
		expect(shown(list, 1, 80)).toEqual(['a', 'b', 'c', '+2']);
		expect(shown(list, 1, 30)).toEqual(['a']);
	});

	it('go on to a second line where they may', () => {
		expect(shown(line(['aaa', 'bbb', 'ccc']), 2, 70)).toEqual(['aaa', 'bbb', 'ccc']);
		expect(shown(line(['aaa', 'bbb', 'ccc', 'ddd', 'eee']), 2, 70)).toEqual(['aaa', 'bbb', 'ccc', 'ddd']);
	});

	it('count the gap between two parts', () => {
		expect(shown(line(['aaa', 'bbb']), 2, 65)).toEqual(['aaa', 'bbb']);
		expect(shown(line(['aaa', 'bbb']), 1, 65)).toEqual(['aaa']);
	});

	it('are broken where one alone is wider than the room', () => {
		expect(shown(line(['a', 'bbbb ccc dd']), 3, 60)).toEqual(['a', 'bbbb', 'ccc', 'dd']);
		expect(shown(line(['a', 'bbbb ccc dd']), 1, 60)).toEqual(['a', 'bbbb']);
	});

	it('keep the first part, however narrow the screen', () => {
		expect(shown(line(['aaaaaa', 'b']), 1, 20)).toEqual(['aaaaaa']);
	});
});
