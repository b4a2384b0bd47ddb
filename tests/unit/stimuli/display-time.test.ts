import { describe, expect, it } from 'vitest';
import { atFrame, onArrival } from '$lib/stimuli/display-time';

const FRAME = 1000 / 60;

describe('a presentation arrives', () => {
	it.each([
		['100 ms ahead', 1100, 'take'],
		['at its time', 1000, 'take'],
		['half a frame after its time', 1000 - FRAME / 2, 'take'],
		['more than a frame after its time', 1000 - FRAME - 0.01, 'late'],
		['ten seconds ahead', 11_000, 'take'],
		['further ahead than can be meant', 11_001, 'too-early']
	])('%s', (_, due, expected) => {
		expect(onArrival(due, 1000, FRAME)).toBe(expected);
	});
});

describe('an animation frame', () => {
	const frame = { stamp: 1000, interval: 16, latency: 10 };

	it.each([
		['is the nearest while the time is within half a frame after it is seen', 1018, 'now'],
		['waits when the next one is nearer', 1018.1, 'wait'],
		['is still right when the time has just passed', 1000, 'now'],
		['shows what it missed by less than 300 ms, measured as it was', 710, 'now'],
		['gives up what is longer past', 709.9, 'gone']
	])('%s', (_, due, expected) => {
		expect(atFrame(due, frame)).toBe(expected);
	});

	it('is at most half a frame off, whatever the phase', () => {
		for (let due = 500; due < 500 + 16; due += 0.37) {
			let stamp = 400;
			while (atFrame(due, { ...frame, stamp }) === 'wait') stamp += 16;
			expect(Math.abs(stamp + 10 - due)).toBeLessThanOrEqual(8);
		}
	});
});
