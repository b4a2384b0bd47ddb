/** A list set into lines of a given width: what fits, and how many of its parts do not. */
export interface Fitted {
	lines: string[][];
	left: number;
}

/**
 * Sets parts one after another into at most `most` lines, dropping from the end what does not fit. Where parts are
 * dropped, room for `more` is kept on the last line.
 *
 * @param measure width of a text in pixels
 * @param gap pixels between two parts
 * @param more the words for "and n more"; without it what is dropped goes unsaid
 */
export function fitParts(
	parts: readonly string[],
	width: number,
	most: number,
	measure: (text: string) => number,
	gap: number,
	more?: (left: number) => string
): Fitted {
	for (let shown = parts.length; shown > 0; shown--) {
		const left = parts.length - shown;
		const wanted = parts.slice(0, shown);
		const lines = setLines(left > 0 && more ? [...wanted, more(left)] : wanted, width, most, measure, gap);
		if (lines) return { lines, left };
	}
	return { lines: more && parts.length > 0 ? [[more(parts.length)]] : [], left: parts.length };
}

function setLines(
	parts: readonly string[],
	width: number,
	most: number,
	measure: (text: string) => number,
	gap: number
): string[][] | null {
	const lines: string[][] = [];
	let used = Infinity;
	for (const part of parts) {
		const wide = measure(part);
		if (wide > width) return null;
		if (used + gap + wide <= width) {
			lines.at(-1)!.push(part);
			used += gap + wide;
		} else {
			if (lines.length === most) return null;
			lines.push([part]);
			used = wide;
		}
	}
	return lines;
}
