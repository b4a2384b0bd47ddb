import { describe, expect, it } from 'vitest';
import { ASSUMED_PX_PER_MM, bestFile, itemSide, lengthAt, letterSize, offsetOf } from '$lib/stimuli/item-size';

describe('length under a visual angle', () => {
	// facts of the trade: a picture of 10 degrees measures about 105 mm at 0.6 m and 175 mm at 1 m (2 d tan(a/2))
	it.each([
		[10, 600, 105],
		[10, 1000, 175]
	])('%d degrees at %d mm is %d mm', (degrees, distance, expected) => {
		expect(Math.round(lengthAt(degrees, distance))).toBe(expected);
	});

	it('is the distance itself at 2 atan(1/2), 53.13 degrees', () => {
		expect(lengthAt((2 * Math.atan(0.5) * 180) / Math.PI, 550)).toBeCloseTo(550, 9);
	});
});

describe('side of an item', () => {
	const wide = { width: 4000, height: 3000 };

	it('is 397 CSS pixels for 105 mm at 96 to the inch', () => {
		expect(itemSide({ degrees: 10, distance: 600 }, ASSUMED_PX_PER_MM, wide)).toBeCloseTo((104.987 / 25.4) * 96, 1);
	});

	it('follows the measured scale', () => {
		const layout = { degrees: 4, distance: 500 };
		expect(itemSide(layout, 8, wide)).toBeCloseTo(2 * itemSide(layout, 4, wide), 9);
	});

	it('never leaves the screen, whichever way it is narrow', () => {
		expect(itemSide({ degrees: 10, distance: 1000 }, 6, { width: 390, height: 844 })).toBe(390);
		expect(itemSide({ degrees: 10, distance: 1000 }, 6, { width: 1280, height: 300 })).toBe(300);
	});
});

describe('offset of the centre', () => {
	it('is a share of half the screen', () => expect(offsetOf(0.5, 1000, 100)).toBe(250));
	it('keeps the whole item on the screen', () => {
		expect(offsetOf(1, 1000, 100)).toBe(450);
		expect(offsetOf(-1, 1000, 100)).toBe(-450);
	});
	it('is nothing when the item fills the screen', () => expect(offsetOf(1, 390, 390)).toBe(0));
});

describe('best file', () => {
	const files = [
		{ file: 'large', width: 1024 },
		{ file: 'small', width: 256 },
		{ file: 'middle', width: 512 }
	];
	it.each([
		[256, 1, 'small'],
		[257, 1, 'middle'],
		[256, 2, 'middle'],
		[300, 2, 'large'],
		[2000, 2, 'large']
	])('for %d pixels at ratio %d is %s', (side, ratio, expected) => {
		expect(bestFile(files, side, ratio)).toBe(expected);
	});
	it('is refused for a picture without files', () => expect(() => bestFile([], 100, 1)).toThrow());
});

describe('size of letters', () => {
	it('is largest for a short word and smallest for a long sentence, within a third and a tenth of the side', () => {
		const sizes = ['cat', 'umbrella', 'The boy climbed up to the top of the', 'x '.repeat(900)].map((text) =>
			letterSize(text, 300)
		);
		expect(sizes[0]).toBe(100);
		expect(sizes.toSorted((a, b) => b - a)).toEqual(sizes);
		expect(sizes.at(-1)).toBe(30);
	});
	it('leaves room for the longest word', () => {
		expect(letterSize('encyclopaedia', 300) * 13 * 0.56).toBeLessThanOrEqual(300.001);
	});
});
