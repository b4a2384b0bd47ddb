import { describe, expect, it } from 'vitest';
import { NUMBER_HEIGHT } from '../../../src/lib/components/ring/ring-geometry';
import { capitalHeight, fontSize, planScreen, type ScreenNeeds } from '../../../src/lib/components/surgeon/screen-plan';

/** Heights of a capital that subtends 22 minutes of arc: 6.4 mm at 1 m, 12.8 at 2 m, 19.2 at 3 m, 25.6 at 4 m. */
describe('the height of text', () => {
	it.each([
		[1000, 6.4],
		[2000, 12.8],
		[3000, 19.2],
		[4000, 25.6]
	])('at %i mm is %f mm', (distance, height) => {
		expect(capitalHeight(distance)).toBeCloseTo(height, 1);
	});

	it('is that of the capitals, not of the font', () => {
		expect(fontSize(3000, 2) * 0.668).toBeCloseTo(2 * 19.2, 1);
	});
});

const needs = (given: Partial<ScreenNeeds>): ScreenNeeds => ({
	width: 1900,
	height: 1070,
	font: 46,
	tags: 12,
	bars: 0,
	fixedLines: 1,
	wishes: 4,
	...given
});

describe('the plan of the screen', () => {
	it('never overflows, whatever is asked of it', () => {
		for (const [width, height] of [
			[1260, 790],
			[1900, 1070],
			[1160, 810]
		] as const) {
			for (const font of [30, 46, 72, 109]) {
				for (let tags = 0; tags <= 40; tags++) {
					for (const bars of [0, 2, 4]) {
						const plan = planScreen(needs({ width, height, font, tags, bars }));
						const lines = (1 + plan.granted) * plan.lineHeight;
						const place = plan.ring + bars * plan.bar + (plan.labels ? plan.lineHeight : 0);
						expect(plan.columns * plan.rows).toBeGreaterThanOrEqual(tags);
						expect(plan.columns * plan.ring).toBeLessThanOrEqual(width);
						expect(lines + plan.rows * place).toBeLessThanOrEqual(height);
					}
				}
			}
		}
	});

	it('grants a wish only while the numbers are as high as the text', () => {
		for (let tags = 1; tags <= 40; tags++) {
			const plan = planScreen(needs({ font: 80, tags }));
			expect(plan.readable).toBe(plan.ring * NUMBER_HEIGHT >= 80 * 0.668 - 1e-9);
			if (!plan.readable) expect(plan.granted).toBe(0);
			if (plan.granted > 0) expect(plan.readableShare).toBe(1);
		}
	});

	it('gives a large screen everything: 30 tags with three bars each, all lines, words under the rings', () => {
		expect(planScreen(needs({ tags: 30, bars: 3, wishes: 5, font: 34 }))).toMatchObject({
			granted: 5,
			labels: true,
			readable: true
		});
	});

	it('says from what share of the distance the numbers of a crowded screen read', () => {
		const plan = planScreen(needs({ width: 1240, height: 790, font: 109, tags: 30 }));
		expect(plan).toMatchObject({ granted: 0, labels: false, readable: false });
		expect(plan.readableShare).toBeGreaterThan(0.4);
		expect(plan.readableShare).toBeLessThan(1);
	});
});
