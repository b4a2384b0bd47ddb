import { createHash } from 'node:crypto';
import canonicalize from 'canonicalize';

/** What the chain is made of, one a row. */
export interface Link {
	case: string;
	position: number;
	receivedAt: string;
	sender: string;
	event: unknown;
}

/** The hash before the first row of every case. */
export const FIRST_PREVIOUS = '0'.repeat(64);

/** JSON in the one form of RFC 8785: two values are the same JSON exactly when this text is the same. */
export function canonicalJson(value: unknown): string {
	const text = canonicalize(value);
	if (text === undefined) throw new TypeError('not a JSON value');
	return text;
}

/** SHA-256 in hex of the previous hash in hex followed by the row in canonical JSON. */
export function chainHash(previous: string, link: Link): string {
	return createHash('sha256').update(previous).update(canonicalJson(link)).digest('hex');
}
