import { describe, expect, it } from 'vitest';
import { readCode } from '$lib/stimuli/pairing-code';

describe('a pairing code', () => {
	it.each([
		['ABCD-EFGH', 'ABCD-EFGH'],
		['#ABCD-EFGH', 'ABCD-EFGH'],
		['abcdefgh', 'ABCD-EFGH'],
		[' ab cd - ef gh ', 'ABCD-EFGH'],
		// Crockford's base 32 reads O as 0, I and L as 1 (crockford.com/base32.html)
		['O0il-LI12', '0011-1112']
	])('%s is read as %s', (text, code) => expect(readCode(text)).toBe(code));

	it.each(['', '#', 'ABCD-EFG', 'ABCD-EFGHJ'])('%s is none', (text) => expect(readCode(text)).toBeNull());
});
