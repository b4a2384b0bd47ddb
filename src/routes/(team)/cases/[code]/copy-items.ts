import type { EventData } from '$lib/mapping/events';

type Copy = EventData['items-copied'];

/** What the log takes in one entry is 400 items, and in one request 256 KiB: this leaves room for the rest of it. */
const MOST_ITEMS = 400;
const MOST_BYTES = 150_000;

/** An item set as entries that are small enough to be sent, in the order of its items. */
export function inParts(copy: Copy): Copy[] {
	const parts: Copy[] = [];
	let items: Copy['items'] = [];
	let size = 0;
	for (const item of copy.items) {
		const bytes = new TextEncoder().encode(JSON.stringify(item)).length;
		if (items.length === MOST_ITEMS || (items.length > 0 && size + bytes > MOST_BYTES)) {
			parts.push({ ...copy, items });
			[items, size] = [[], 0];
		}
		items.push(item);
		size += bytes;
	}
	return items.length > 0 ? [...parts, { ...copy, items }] : parts;
}
