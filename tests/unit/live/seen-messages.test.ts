import { expect, it } from 'vitest';
import { SeenMessages } from '$lib/live/seen-messages';

it('takes a message once, by whichever way it comes first', () => {
	const seen = new SeenMessages();
	expect([seen.isNew('a'), seen.isNew('b'), seen.isNew('a'), seen.isNew('b')]).toEqual([true, true, false, false]);
});

it('forgets the oldest of very many, never the recent ones', () => {
	const seen = new SeenMessages();
	for (let i = 0; i < 1500; i++) seen.isNew(String(i));
	expect(seen.isNew('1499')).toBe(false);
	expect(seen.isNew('600')).toBe(false);
	expect(seen.isNew('0')).toBe(true);
});
