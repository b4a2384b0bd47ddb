import { describe, expect, test } from 'vitest';
import {
	assignKeys,
	changeCommandKey,
	COMMANDS,
	DEFAULT_COMMAND_KEYS,
	meaningOf,
	padMeaningOf,
	type Press
} from '$lib/live/keys';
import { DEFAULT_PROTOCOL } from '$lib/mapping/protocol';
import { ERROR_KINDS, type ErrorKind } from '$lib/mapping/vocabulary';

/** A key event as browsers give it (W3C UI Events: `key` is what is printed, `code` is where the key lies). */
function press(code: string, key: string, held: Partial<Press> = {}): Press {
	return { code, key, shiftKey: false, ctrlKey: false, altKey: false, metaKey: false, ...held };
}

const map = assignKeys(DEFAULT_PROTOCOL.kinds);

describe('the keys of the kinds', () => {
	const scored = (kinds: readonly ErrorKind[]) =>
		kinds.filter((kind) => kind !== 'afterdischarge' && kind !== 'seizure');

	test('every kind of a protocol has a key of its own that no command has, be it all of them', () => {
		for (const kinds of [DEFAULT_PROTOCOL.kinds, ERROR_KINDS]) {
			const { commands, kinds: keys } = assignKeys(kinds);
			expect(Object.keys(keys).sort()).toEqual(scored(kinds).sort());
			const all = [...Object.values(commands), ...Object.values(keys)];
			expect(new Set(all).size).toBe(all.length);
		}
	});

	test('a kind that is on alone has the same key as beside the others', () => {
		for (const kind of scored(DEFAULT_PROTOCOL.kinds)) {
			expect(assignKeys([kind]).kinds[kind]).toBe(map.kinds[kind]);
		}
	});

	test('a key that was chosen goes before one that is preferred; a command keeps its own', () => {
		const chosen = assignKeys(['anomia', 'speech-arrest'], { kinds: { anomia: 'a', 'speech-arrest': 'c' } });
		expect(chosen.kinds.anomia).toBe('a');
		expect(chosen.kinds['speech-arrest']).not.toBe('a');
		expect(chosen.kinds['speech-arrest']).not.toBe('c');
	});

	test('the key of a command that is given to another is given in exchange', () => {
		const changed = changeCommandKey(DEFAULT_COMMAND_KEYS, 'skip', 'b');
		expect(changed).toEqual({ ...DEFAULT_COMMAND_KEYS, skip: 'b', blank: 'k' });
		expect(changeCommandKey(DEFAULT_COMMAND_KEYS, 'skip', 'k')).toEqual(DEFAULT_COMMAND_KEYS);
		expect(new Set(Object.values(changed)).size).toBe(COMMANDS.length);
	});
});

describe('what a key means', () => {
	test('digits by where they lie: the row of a French keyboard prints other characters', () => {
		expect(meaningOf(press('Digit7', '7'), map)).toEqual({ tag: '7' });
		expect(meaningOf(press('Digit7', 'è'), map)).toEqual({ tag: '7' });
		expect(meaningOf(press('Numpad7', '7'), map)).toEqual({ tag: '7' });
	});

	test('letters by what is printed: Z and Y are exchanged on a German keyboard', () => {
		expect(meaningOf(press('KeyY', 'z'), map)).toEqual({ do: 'seizure' });
		expect(meaningOf(press('KeyZ', 'y'), map)).toBeNull();
		expect(meaningOf(press('KeyQ', 'a'), map)).toEqual({ score: 'speech-arrest' });
	});

	test('a letter with Shift belongs to a tag; a key with Shift can be another command', () => {
		expect(meaningOf(press('KeyB', 'B', { shiftKey: true }), map)).toEqual({ tag: 'B' });
		expect(meaningOf(press('Backspace', 'Backspace'), map)).toEqual({ do: 'take-back' });
		expect(meaningOf(press('Backspace', 'Backspace', { shiftKey: true }), map)).toEqual({ do: 'redo' });
		expect(meaningOf(press('Equal', '+', { shiftKey: true }), map)).toEqual({ do: 'shown' });
	});

	test('keys with Ctrl, Alt or Meta are the browser’s, and a kind that is off has none', () => {
		for (const held of ['ctrlKey', 'altKey', 'metaKey']) {
			expect(meaningOf(press('KeyN', 'n', { [held]: true }), map)).toBeNull();
		}
		expect(meaningOf(press('KeyN', 'n'), map)).toEqual({ score: 'anomia' });
		expect(meaningOf(press('KeyN', 'n'), assignKeys(['delay']))).toBeNull();
	});
});

describe('the number pad alone', () => {
	const kinds = ERROR_KINDS.slice(0, 12);
	const on = (code: string, at: { waiting?: boolean; asked?: boolean } = {}, page = 0) =>
		padMeaningOf(press(`Numpad${code}`, ''), { kinds, page }, { waiting: false, asked: false, ...at });

	test('digits choose the tag, and score while a trial waits', () => {
		expect(on('3')).toEqual({ tag: '3' });
		expect(on('0')).toEqual({ tag: '0' });
		expect(on('3', { waiting: true })).toEqual({ score: kinds[2] });
		expect(on('3', { waiting: true }, 1)).toEqual({ score: kinds[11] });
	});

	test('Enter shows, and is intact while a trial waits', () => {
		expect(on('Enter')).toEqual({ do: 'show' });
		expect(on('Enter', { waiting: true })).toEqual({ do: 'intact' });
	});

	test('plus and minus answer while it is asked whether the item was shown', () => {
		expect([on('Add'), on('Subtract')]).toEqual([{ do: 'control' }, { do: 'take-back' }]);
		const asked = { asked: true, waiting: true };
		expect([on('Add', asked), on('Subtract', asked)]).toEqual([{ do: 'shown' }, { do: 'not-shown' }]);
	});

	test('the star turns to the next nine kinds and back', () => {
		expect(on('Multiply')).toEqual({ page: 1 });
		expect(on('Multiply', {}, 1)).toEqual({ page: 0 });
	});
});
