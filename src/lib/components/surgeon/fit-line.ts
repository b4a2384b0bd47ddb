/** A few words that stand or fall together. */
export interface Part {
	text: string;
	/** fewer words for the same, where there is no room for all */
	short?: string;
	/** ember is for disturbed trials and positive sites alone; mute is set in the regular weight, the rest bold */
	tone: 'ink' | 'mute' | 'frost' | 'ember';
}

/** Parts in the order in which they may not be missed. */
export interface Line {
	parts: Part[];
	/** says how many parts there was no room for; without it what is left out goes unsaid */
	more?: (left: number) => string;
}

/** The room that a line has, in pixels, and how wide words are in it. */
export interface Room {
	width: number;
	/** between two parts */
	gap: number;
	measure: (part: Part) => number;
}

/** The parts that are shown, in order, and how many are not. */
export interface Fitted {
	parts: Part[];
	left: number;
}

/**
 * Sets a line into at most `most` lines of the room: in full, else in short words, else without its last parts. Words
 * are never set smaller. The first part always stands; one that is wider than the room is broken into its words.
 */
export function fitLine(line: Line, most: number, room: Room): Fitted {
	const full = line.parts.flatMap((part) => broken(part, room));
	if (fits(full, most, room)) return { parts: full, left: 0 };
	const short = line.parts.flatMap(({ short, ...part }) => broken({ ...part, text: short ?? part.text }, room));
	for (let shown = short.length; shown > 1; shown--) {
		const left = short.length - shown;
		const parts = [...short.slice(0, shown), ...moreOf(line, left)];
		if (fits(parts, most, room)) return { parts, left };
	}
	const left = short.length - 1;
	const withMore = [...short.slice(0, 1), ...moreOf(line, left)];
	return { parts: fits(withMore, most, room) ? withMore : short.slice(0, 1), left };
}

function broken(part: Part, { width, measure }: Room): Part[] {
	if (measure(part) <= width) return [part];
	return part.text.split(' ').map((text) => ({ text, tone: part.tone }));
}

function moreOf({ more }: Line, left: number): Part[] {
	return more && left > 0 ? [{ text: more(left), tone: 'mute' }] : [];
}

function fits(parts: readonly Part[], most: number, { width, gap, measure }: Room): boolean {
	let lines = 1;
	let used = -gap;
	for (const part of parts) {
		const wide = measure(part);
		if (used + gap + wide > width) {
			lines++;
			used = -gap;
		}
		used += gap + wide;
		if (used > width || lines > most) return false;
	}
	return true;
}
