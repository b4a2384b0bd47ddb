/** CSS pixels per millimetre on a screen that was not calibrated: 96 to the inch (CSS Values and Units 4, section 5.2). */
export const ASSUMED_PX_PER_MM = 96 / 25.4;

/** A card of the size ID-1, as bank and identity cards have it (ISO/IEC 7810), in millimetres. */
export const CARD = { width: 85.6, height: 53.98 };

/**
 * How long something is that is seen under an angle: 2 d tan(angle / 2).
 *
 * @param degrees visual angle
 * @param distance from the eyes, in any unit of length
 * @returns in the unit of `distance`
 */
export function lengthAt(degrees: number, distance: number): number {
	return 2 * distance * Math.tan((degrees * Math.PI) / 360);
}

/** Side in CSS pixels of the square an item lies in: its visual angle, or what the screen has room for. */
export function itemSide(
	{ degrees, distance }: { degrees: number; distance: number },
	pxPerMm: number,
	screen: { width: number; height: number }
): number {
	return Math.min(lengthAt(degrees, distance) * pxPerMm, screen.width, screen.height);
}

/**
 * Centre of an item in CSS pixels from the middle of the screen; it is moved back where it would leave the screen.
 *
 * @param share -1 to 1, of half the screen
 * @param length of the screen that way
 */
export function offsetOf(share: number, length: number, side: number): number {
	const room = Math.max(0, (length - side) / 2);
	return Math.min(room, Math.max(-room, (share * length) / 2));
}

/** The smallest file that fills `side` on a screen of that pixel ratio; the widest when none does. */
export function bestFile(files: readonly { file: string; width: number }[], side: number, pixelRatio: number): string {
	const byWidth = files.toSorted((a, b) => a.width - b.width);
	const best = byWidth.find(({ width }) => width >= side * pixelRatio) ?? byWidth.at(-1);
	if (!best) throw new Error('a picture without files');
	return best.file;
}

const EM_PER_LETTER = 0.56;
const LINE = 1.25;

/**
 * Size of letters in CSS pixels so that a text fills its square without leaving it: between a tenth of the side for
 * long sentences and a third for short words. An estimate by the mean width of the typeface's letters.
 */
export function letterSize(text: string, side: number): number {
	const longest = Math.max(1, ...text.split(/\s+/).map((word) => word.length));
	const byWord = side / (longest * EM_PER_LETTER);
	const byArea = Math.sqrt((side * side) / (Math.max(1, text.length) * EM_PER_LETTER * LINE));
	return Math.max(side / 10, Math.min(side / 3, byWord, byArea * 0.9));
}
