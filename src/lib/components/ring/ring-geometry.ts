import type { Effect } from '$lib/mapping/vocabulary';

/** How a trial is drawn: thick and solid, thin, dotted; a trial still to do is a faint track. */
export type Mark = Effect | 'missing';

/** One arc of a ring in a square of 100 by 100; degrees run clockwise from the top. */
export interface Arc {
	mark: Mark;
	from: number;
	to: number;
	/** the centre line, as the `d` of an SVG path */
	path: string;
}

/** Radius of the centre line of every arc. */
export const RADIUS = 43.5;
/** Radius of a filled centre. */
export const CENTRE_RADIUS = 35.5;
/** Width of an arc's line. */
export const WIDTHS: Readonly<Record<Mark, number>> = { disturbed: 11, intact: 3.5, excluded: 4.5, missing: 2 };

/** Height of a capital of Atkinson Hyperlegible, as a share of its font size (the font's OS/2 table: 668 of 1000). */
export const CAP_HEIGHT = 0.668;
const FONT_SIZE = 51;
/** Height of the number, as a share of the ring's side. */
export const NUMBER_HEIGHT = (FONT_SIZE * CAP_HEIGHT) / 100;

const MIDDLE = 50;
const WIDEST_GAP = 7;

/**
 * The trials of one result in order, then those that are still missing: as many as its excluded trials plus the
 * larger of its valid trials and the rule's minimum.
 */
export function marks(effects: readonly Effect[], minTrials: number): Mark[] {
	const valid = effects.filter((effect) => effect !== 'excluded').length;
	return [...effects, ...Array<Mark>(Math.max(0, minTrials - valid)).fill('missing')];
}

/** The arcs of a ring, one a mark, all of one length, clockwise from the top. */
export function arcs(list: readonly Mark[]): Arc[] {
	const step = 360 / list.length;
	const gap = list.length === 1 ? 0 : Math.min(WIDEST_GAP, step / 4);
	return list.map((mark, index) => {
		const from = index * step + gap / 2;
		const to = (index + 1) * step - gap / 2;
		return { mark, from, to, path: arcPath(from, to) };
	});
}

/** An arc of less than a whole turn, or a circle in two halves: SVG draws no arc that ends where it began. */
function arcPath(from: number, to: number): string {
	if (to - from < 360) return `M${point(from)}${arcTo(to, to - from > 180)}`;
	return `M${point(from)}${arcTo(from + 180, false)}${arcTo(to, false)}`;
}

function arcTo(degrees: number, large: boolean): string {
	return `A${RADIUS} ${RADIUS} 0 ${large ? 1 : 0} 1 ${point(degrees)}`;
}

function point(degrees: number): string {
	const angle = (degrees * Math.PI) / 180;
	return `${round(MIDDLE + RADIUS * Math.sin(angle))} ${round(MIDDLE - RADIUS * Math.cos(angle))}`;
}

function round(value: number): number {
	return Math.round(value * 1000) / 1000;
}

/** The number in a ring: its size, its baseline, and how wide it may be before it is set narrower. */
export interface NumberSetting {
	fontSize: number;
	baseline: number;
	/** `textLength` of a number too wide for the centre; null where its own width fits */
	width: number | null;
}

/**
 * Advance of a bold tabular digit and of a wide capital of Atkinson Hyperlegible, in font sizes (measured in
 * Chromium: 0.632, "M" 0.842).
 */
const DIGIT_ADVANCE = 0.632;
const CAPITAL_ADVANCE = 0.842;

/** All numbers have one height, so that all read from the same distance; a long one is set narrower. */
export function numberSetting(tag: string): NumberSetting {
	const half = (FONT_SIZE * CAP_HEIGHT) / 2;
	const room = 2 * Math.sqrt((CENTRE_RADIUS - 1) ** 2 - half ** 2);
	const own = FONT_SIZE * [...tag].reduce((sum, sign) => sum + (/\d/.test(sign) ? DIGIT_ADVANCE : CAPITAL_ADVANCE), 0);
	return { fontSize: FONT_SIZE, baseline: MIDDLE + half, width: own > room ? round(room) : null };
}
