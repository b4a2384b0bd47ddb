import { createHash } from 'node:crypto';

/**
 * JSON in the form of RFC 8785, written apart from the program so that its hashes can be checked: names sorted by
 * UTF-16 code units, no blanks, numbers and text as ECMAScript writes them.
 */
export function canonical(value: unknown): string {
	if (Array.isArray(value)) return `[${value.map(canonical).join(',')}]`;
	if (value === null || typeof value !== 'object') return JSON.stringify(value);
	const fields = Object.entries(value).sort(([a], [b]) => (a < b ? -1 : 1));
	return `{${fields.map(([name, inner]) => `${JSON.stringify(name)}:${canonical(inner)}`).join(',')}}`;
}

export interface Stored {
	position: number;
	receivedAt: string;
	sender: string;
	hash: string;
	id: string;
	type: string;
	[field: string]: unknown;
}

/** The hash of an entry by the formula of the contract, from what GET events answers. */
export function hashOf(previous: string, code: string, entry: Stored): string {
	const { position, receivedAt, sender } = entry;
	const added = ['position', 'receivedAt', 'sender', 'hash'];
	const event = Object.fromEntries(Object.entries(entry).filter(([name]) => !added.includes(name)));
	const link = canonical({ case: code, position, receivedAt, sender, event });
	return createHash('sha256')
		.update(previous + link, 'utf8')
		.digest('hex');
}
