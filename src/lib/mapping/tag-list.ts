import { compareTags } from './sites';
import { TAG_PATTERN } from './vocabulary';

/** Tags as somebody wrote them in a row, and the words that are none. */
export interface TagList {
	tags: string[];
	faults: string[];
}

const RANGE = /(\d+)\s*(?:to|-|–|\.\.)\s*(\d+)/gi;
const LONGEST_RANGE = 60;

/** Reads "1 to 12", "1-12", "3, 4, A" and mixtures of them; each tag once, in the order written. */
export function parseTags(text: string): TagList {
	const faults: string[] = [];
	const spread = text.replace(RANGE, (whole, first: string, last: string) => {
		const [from, to] = [Number(first), Number(last)];
		if (from < 1 || to < from || to - from >= LONGEST_RANGE) {
			faults.push(whole.trim());
			return ' ';
		}
		return ` ${Array.from({ length: to - from + 1 }, (_, i) => from + i).join(' ')} `;
	});
	const tags = new Set<string>();
	for (const word of spread.split(/[\s,;]+/).filter(Boolean)) {
		const tag = word.toUpperCase();
		if (TAG_PATTERN.test(tag)) tags.add(tag);
		else faults.push(word);
	}
	return { tags: [...tags], faults };
}

const LETTERS = 'BCDEFGHIJKLMNOPQRSTUVWXYZ';

/**
 * The name for a tag that is laid on another spot, which is a new site: 7 becomes 7B, 7B becomes 7C, A becomes A2.
 *
 * @param used every tag that is laid or was
 * @returns null when no name is free
 */
export function nameForNewSpot(tag: string, used: ReadonlySet<string>): string | null {
	const endings = /^\d/.test(tag) ? LETTERS : '23456789';
	const stem = /^(\d+)[A-Z]$/.exec(tag)?.[1] ?? tag;
	for (const ending of endings) {
		const name = stem + ending;
		if (TAG_PATTERN.test(name) && !used.has(name)) return name;
	}
	return null;
}

/** The number that comes next in the row: one more than the highest one used. */
export function nextNumber(used: Iterable<string>): string {
	const highest = [...used]
		.filter((tag) => /^\d+/.test(tag))
		.sort(compareTags)
		.at(-1);
	return String(highest === undefined ? 1 : Number.parseInt(highest, 10) + 1);
}
