import { TAG_PATTERN } from '$lib/mapping/vocabulary';

/** A tag as it is typed. */
export interface TagEntry {
	typed: string;
	/** when the last character came, in milliseconds of any one clock */
	at: number;
}

/** How long the next character still belongs to the same tag, in milliseconds. */
export const TAG_PAUSE = 1500;

/**
 * Adds a character to the tag that is being typed. It goes on with what was typed just before where that still can
 * become one of the tags; otherwise it begins a new tag.
 */
export function typeTag(entry: TagEntry | null, character: string, at: number, tags: readonly string[]): TagEntry {
	const longer = (entry?.typed ?? '') + character;
	const goesOn = entry !== null && at - entry.at <= TAG_PAUSE && tags.some((tag) => tag.startsWith(longer));
	return { typed: goesOn ? longer : character, at };
}

/** The tag that stands for what was typed: one that is laid, or null. */
export function chosenTag(entry: TagEntry | null, tags: readonly string[]): string | null {
	return entry !== null && TAG_PATTERN.test(entry.typed) && tags.includes(entry.typed) ? entry.typed : null;
}
