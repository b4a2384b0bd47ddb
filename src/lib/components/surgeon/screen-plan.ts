import { CAP_HEIGHT, NUMBER_HEIGHT } from '../ring/ring-geometry';

/**
 * Text on the surgeon's screen is at least this high, in minutes of arc: the upper end of what ISO 9241-3 prefers (20 to
 * 22, 16 at least).
 */
const MINUTES_OF_ARC = 22;

/** Height of a capital that reads from a distance, in the unit of the distance: 19.2 mm at 3 m. */
export function capitalHeight(distance: number): number {
	return 2 * distance * Math.tan(((MINUTES_OF_ARC / 60) * Math.PI) / 360);
}

/** Font size of Atkinson Hyperlegible in pixels for a reader at `distanceMm`. */
export function fontSize(distanceMm: number, pxPerMm: number): number {
	return (capitalHeight(distanceMm) * pxPerMm) / CAP_HEIGHT;
}

const LINE_HEIGHT = 1.15;
/** Height of one bar of a task and language, as a share of the ring's side. */
const BAR_SHARE = 0.085;
/** Room around a ring, as a share of its side. */
const RING_GAP = 0.06;
/** A ring takes no more than this share of the screen's height, however few there are. */
const LARGEST_RING = 0.4;

export interface ScreenNeeds {
	/** pixels */
	width: number;
	height: number;
	/** pixels; see fontSize */
	font: number;
	tags: number;
	/** tasks and languages shown as bars under each ring; 0 where one is all there is */
	bars: number;
	/** lines that are never dropped: the last trial, and whatever is wrong */
	fixedLines: number;
	/** lines wished for, the most wanted first: each is shown when the rings stay readable beside it */
	wishes: number;
}

export interface ScreenPlan {
	columns: number;
	rows: number;
	/** side of a ring in pixels */
	ring: number;
	/** width of a ring's place in pixels */
	place: number;
	bar: number;
	lineHeight: number;
	/** how many of the wishes are granted */
	granted: number;
	/** words under each ring */
	labels: boolean;
	/** the numbers in the rings are as high as the text: false when there are too many tags for this screen */
	readable: boolean;
	/** from what share of the distance the numbers read; 1 where they read from all of it */
	readableShare: number;
}

/** Divides the screen: text never gets smaller than its size, and what is less wanted goes before a ring's number does. */
export function planScreen(needs: ScreenNeeds): ScreenPlan {
	const lineHeight = Math.ceil(needs.font * LINE_HEIGHT);
	const smallest = (needs.font * CAP_HEIGHT) / NUMBER_HEIGHT;
	const plan = (granted: number, labels: boolean): ScreenPlan => {
		const grid = placeRings({
			width: needs.width,
			height: Math.max(0, needs.height - (needs.fixedLines + granted) * lineHeight),
			tags: needs.tags,
			bars: needs.bars,
			label: labels ? lineHeight : 0,
			largest: needs.height * LARGEST_RING
		});
		const readable = grid.ring >= smallest;
		return { ...grid, lineHeight, granted, labels, readable, readableShare: Math.min(1, grid.ring / smallest) };
	};
	let best = plan(0, false);
	for (let granted = 1; granted <= needs.wishes; granted++) {
		const next = plan(granted, false);
		if (!next.readable) return best;
		best = next;
	}
	const labelled = plan(best.granted, true);
	return labelled.readable ? labelled : best;
}

interface Grid {
	width: number;
	height: number;
	tags: number;
	bars: number;
	/** height of the words under a ring */
	label: number;
	largest: number;
}

/** The number of columns that makes the rings largest, and of those the fewest rows. */
function placeRings({ width, height, tags, bars, label, largest }: Grid) {
	const count = Math.max(1, tags);
	let best = { columns: 1, rows: count, ring: 0, place: width };
	for (let columns = 1; columns <= count; columns++) {
		const rows = Math.ceil(count / columns);
		const place = width / columns;
		const side = Math.min(place / (1 + RING_GAP), (height / rows - label) / (1 + RING_GAP + bars * BAR_SHARE), largest);
		if (side > best.ring) best = { columns, rows, ring: side, place };
	}
	const ring = Math.max(0, Math.floor(best.ring));
	return { ...best, ring, bar: ring * BAR_SHARE };
}
