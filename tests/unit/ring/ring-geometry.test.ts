import { describe, expect, it } from 'vitest';
import {
	arcs,
	CENTRE_RADIUS,
	marks,
	NUMBER_HEIGHT,
	numberSetting,
	RADIUS,
	WIDTHS,
	type Mark
} from '../../../src/lib/components/ring/ring-geometry';
import type { Effect } from '../../../src/lib/mapping/vocabulary';

const EFFECTS: Record<string, Effect> = { d: 'disturbed', i: 'intact', v: 'excluded' };
const MARKS: Record<string, Mark> = { ...EFFECTS, '.': 'missing' };
const effects = (text: string) => [...text].map((sign) => EFFECTS[sign]!);

/** Arcs by the sentence of the design: "as many as its excluded trials plus the larger of valid trials and minimum". */
describe('the marks of a ring under the rule of three', () => {
	it.each([
		['untested', '', '...'],
		['open, one intact', 'i', 'i..'],
		['open, one disturbed', 'd', 'd..'],
		['negative 0 of 3', 'iii', 'iii'],
		['negative 1 of 3', 'idi', 'idi'],
		['positive 2 of 3', 'did', 'did'],
		['positive 3 of 3', 'ddd', 'ddd'],
		['one excluded: 3 of 4 count', 'dvid', 'dvid'],
		['negative 2 of 4', 'ddii', 'ddii'],
		['positive 4 of 6', 'ddidid', 'ddidid'],
		['open, settled positive', 'dd', 'dd.'],
		['twelve trials', 'diiiidiiidii', 'diiiidiiidii'],
		['excluded ones alone', 'vv', 'vv...'],
		['an excluded one among those still open', 'ivi', 'ivi.']
	])('%s', (_, trials, drawn) => {
		expect(marks(effects(trials), 3)).toEqual([...drawn].map((sign) => MARKS[sign]));
	});

	it('follows the minimum of the protocol', () => {
		expect(marks(effects('di'), 5)).toHaveLength(5);
		expect(marks(effects('di'), 1)).toHaveLength(2);
	});
});

describe('the arcs of a ring', () => {
	const many = (count: number) => arcs(Array<Mark>(count).fill('intact'));

	it('run clockwise from the top, in order, without touching, and are of one length', () => {
		for (let count = 2; count <= 40; count++) {
			const ring = many(count);
			expect(ring).toHaveLength(count);
			expect(ring[0]!.from).toBeGreaterThan(0);
			expect(ring.at(-1)!.to).toBeLessThan(360);
			for (const [index, arc] of ring.entries()) {
				expect(arc.to).toBeGreaterThan(arc.from);
				expect(arc.to - arc.from).toBeCloseTo(ring[0]!.to - ring[0]!.from, 9);
				if (index > 0) expect(arc.from).toBeGreaterThan(ring[index - 1]!.to);
			}
		}
	});

	it('keep their marks in order', () => {
		expect(arcs(['disturbed', 'excluded', 'missing']).map(({ mark }) => mark)).toEqual([
			'disturbed',
			'excluded',
			'missing'
		]);
	});

	it('begin at the top and go to the right', () => {
		const numbers = many(4)[0]!
			.path.match(/-?[\d.]+/g)!
			.map(Number);
		const [x, y] = [numbers[0]!, numbers[1]!];
		const [endX, endY] = [numbers.at(-2)!, numbers.at(-1)!];
		expect(x).toBeGreaterThan(50);
		expect(y).toBeLessThan(50);
		expect(endX).toBeGreaterThan(x);
		expect(endY).toBeLessThan(50);
		for (const [px, py] of [[x, y] as const, [endX, endY] as const]) {
			expect(Math.hypot(px - 50, py - 50)).toBeCloseTo(RADIUS, 2);
		}
	});

	it('a single trial is a whole circle', () => {
		const [arc] = many(1);
		expect([arc!.from, arc!.to]).toEqual([0, 360]);
		expect(arc!.path.match(/A/g)).toHaveLength(2);
	});

	it('of two trials no arc is the larger half', () => {
		for (const { path } of many(2)) expect(path).toMatch(/^M\S+ \S+A43\.5 43\.5 0 0 1 /);
	});

	it('stay clear of the centre and inside the square, and differ in width', () => {
		expect(RADIUS - WIDTHS.disturbed / 2).toBeGreaterThan(CENTRE_RADIUS);
		expect(RADIUS + WIDTHS.disturbed / 2).toBeLessThanOrEqual(50);
		expect(WIDTHS.disturbed).toBeGreaterThanOrEqual(3 * WIDTHS.intact);
		expect(WIDTHS.intact).toBeGreaterThan(WIDTHS.missing);
	});
});

describe('the number in a ring', () => {
	it('is as high for every tag, and set narrower only where it would leave the centre', () => {
		for (const tag of ['1', '7', '10', '88', '7B', '12B', 'ABC', 'WWW']) {
			const { fontSize, baseline, width } = numberSetting(tag);
			expect(fontSize * 0.668).toBeCloseTo(NUMBER_HEIGHT * 100, 9);
			expect(baseline - 50).toBeCloseTo((NUMBER_HEIGHT * 100) / 2, 9);
			if (width !== null) expect(Math.hypot(width / 2, (NUMBER_HEIGHT * 100) / 2)).toBeLessThanOrEqual(CENTRE_RADIUS);
		}
		expect(numberSetting('7').width).toBeNull();
		expect(numberSetting('12B').width).not.toBeNull();
	});
});
