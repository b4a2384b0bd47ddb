import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { bestOffset, type ClockSample } from '$lib/live/server-clock.svelte';

/**
 * F. Cristian, "Probabilistic clock synchronization", Distributed Computing 1989;3:146: a clock read over a line with a
 * round trip of D is known to within D / 2, when nothing is known of how D is shared between the two ways.
 */
describe('the offset of the server’s clock', () => {
	/** An exchange with a server that is `offset` ahead and takes `there` and `back` milliseconds on the way. */
	function exchange(offset: number, sent: number, there: number, back: number): ClockSample {
		return { sent, server: sent + there + offset, received: sent + there + back };
	}

	test('is exact when both ways take the same time', () => {
		expect(bestOffset([exchange(-1234, 5000, 20, 20)])).toEqual({ offset: -1234, uncertainty: 20 });
	});

	test('is never further off than it says, and at worst just that far', () => {
		const way = fc.integer({ min: 0, max: 5000 });
		fc.assert(
			fc.property(
				fc.integer({ min: -(10 ** 9), max: 10 ** 9 }),
				fc.array(fc.tuple(way, way), { minLength: 1, maxLength: 8 }),
				(offset, ways) => {
					const samples = ways.map(([there, back], index) => exchange(offset, index * 10_000, there, back));
					const found = bestOffset(samples)!;
					expect(Math.abs(found.offset - offset)).toBeLessThanOrEqual(found.uncertainty);
					expect(found.uncertainty).toBe(Math.min(...ways.map(([there, back]) => there + back)) / 2);
				}
			)
		);
		const worst = bestOffset([exchange(0, 0, 0, 80)])!;
		expect(Math.abs(worst.offset)).toBe(worst.uncertainty);
	});

	test('is not known without an answer', () => {
		expect(bestOffset([])).toBeNull();
	});
});
