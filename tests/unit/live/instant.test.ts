import { expect, it } from 'vitest';
import { instantOf } from '$lib/live/instant';

// RFC 3339 section 5.6: fractions of a second of any length
it.each([
	[0, '1970-01-01T00:00:00.000000Z'],
	[1_767_225_600_123.456, '2026-01-01T00:00:00.123456Z'],
	[1_767_225_599_999.9998, '2026-01-01T00:00:00.000000Z']
])('%d is %s', (milliseconds, text) => expect(instantOf(milliseconds)).toBe(text));
