/** When a patient view shows what it was told to. All times in milliseconds of one clock. */

/** A presentation further ahead than this was sent by a clock that is wrong. */
export const FARTHEST_AHEAD = 10_000;

/** Without a frame for so long after its time a presentation is given up: later it would mislead. */
export const LONGEST_WAIT = 300;

/**
 * What to do with a presentation when it arrives.
 *
 * @param frame length of one frame: so much after its time is still in time
 */
export function onArrival(due: number, now: number, frame: number): 'take' | 'late' | 'too-early' {
	if (now - due > frame) return 'late';
	return due - now > FARTHEST_AHEAD ? 'too-early' : 'take';
}

/** One animation frame. */
export interface Frame {
	/** the time stamp the browser gave it */
	stamp: number;
	/** from one frame to the next */
	interval: number;
	/** from the time stamp to the moment the frame is on the screen, as measured so far */
	latency: number;
}

/**
 * Whether this frame is the one nearest to the time: the next one would be on the screen further from it. `gone` when
 * the time is so long past that nothing may be shown any more.
 */
export function atFrame(due: number, { stamp, interval, latency }: Frame): 'wait' | 'now' | 'gone' {
	const seen = stamp + latency;
	if (seen - due > LONGEST_WAIT) return 'gone';
	return due - seen <= interval / 2 ? 'now' : 'wait';
}
