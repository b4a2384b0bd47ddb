import { ERROR_KINDS, type ErrorKind } from '$lib/mapping/vocabulary';

/** What a key can do in a run, besides choosing a tag and scoring. */
export const COMMANDS = [
	'show',
	'intact',
	'control',
	'take-back',
	'redo',
	'said',
	'current',
	'move',
	'skip',
	'next-task',
	'next-language',
	'afterdischarge',
	'seizure',
	'blank',
	'earlier',
	'later',
	'newest',
	'shown',
	'not-shown'
] as const;
export type Command = (typeof COMMANDS)[number];

/** What a key press means. */
export type KeyMeaning =
	| { do: Command }
	| { score: ErrorKind }
	/** one more character of a tag */
	| { tag: string };

/** Keys by what is printed on them, in lower case; the number pad's by their position. */
export interface KeyMap {
	commands: Record<Command, string>;
	kinds: Partial<Record<ErrorKind, string>>;
}

export const DEFAULT_COMMAND_KEYS: Readonly<Record<Command, string>> = {
	show: 'space',
	intact: 'enter',
	control: 'c',
	'take-back': 'backspace',
	redo: 'shift+backspace',
	said: ',',
	current: 'm',
	move: '.',
	skip: 'k',
	'next-task': 'j',
	'next-language': 'l',
	afterdischarge: 'g',
	seizure: 'z',
	blank: 'b',
	earlier: 'arrowup',
	later: 'arrowdown',
	newest: 'escape',
	shown: '+',
	'not-shown': '-'
};

/** The letter a kind likes best; the others take what is free. */
const PREFERRED: Partial<Record<ErrorKind, string>> = {
	'speech-arrest': 'a',
	anomia: 'n',
	'no-response': 'r',
	'semantic-paraphasia': 's',
	'phonemic-paraphasia': 'p',
	'unrelated-word': 'u',
	perseveration: 'v',
	'wrong-language': 'w',
	error: 'e',
	dysarthria: 'd',
	delay: 't',
	'self-correction': 'f',
	'not-scorable': 'x',
	'item-not-known': 'i',
	'wrong-spot': 'o',
	inattentive: 'q'
};

/** The command that has a key, or null. */
export function commandWith(commands: Readonly<Record<Command, string>>, key: string): Command | null {
	return COMMANDS.find((candidate) => commands[candidate] === key) ?? null;
}

/**
 * The command keys with one changed. A key does one thing: the command that had the new key takes the old one.
 *
 * @param commands the keys as they are
 */
export function changeCommandKey(
	commands: Readonly<Record<Command, string>>,
	command: Command,
	key: string
): Record<Command, string> {
	const other = commandWith(commands, key);
	return { ...commands, ...(other ? { [other]: commands[command] } : {}), [command]: key };
}

/** Letters, then function keys that no browser needs. */
const SPARE = [...'hyqiofuwxvtdepsrna', 'f2', 'f3', 'f4', 'f6', 'f7', 'f8', 'f9', 'f10'];

/** Afterdischarge and seizure are commands: they exclude the trial and say what to do. */
function hasKey(kind: ErrorKind): boolean {
	return kind !== 'afterdischarge' && kind !== 'seizure';
}

/**
 * Gives every kind that the protocol has on a key of its own: the one somebody chose, else its preferred letter, else
 * the next that is free.
 *
 * @param chosen keys somebody set on this device
 */
export function assignKeys(kinds: readonly ErrorKind[], chosen: Partial<KeyMap> = {}): KeyMap {
	const commands = { ...DEFAULT_COMMAND_KEYS, ...chosen.commands };
	const taken = new Set(Object.values(commands));
	const assigned: KeyMap['kinds'] = {};
	const give = (kind: ErrorKind, key: string | undefined) => {
		if (key === undefined || taken.has(key) || assigned[kind] !== undefined) return;
		assigned[kind] = key;
		taken.add(key);
	};
	const wanted = ERROR_KINDS.filter((kind) => kinds.includes(kind) && hasKey(kind));
	for (const kind of wanted) give(kind, chosen.kinds?.[kind]);
	for (const kind of wanted) give(kind, PREFERRED[kind]);
	for (const kind of wanted)
		give(
			kind,
			SPARE.find((key) => !taken.has(key))
		);
	return { commands, kinds: assigned };
}

/** The parts of a keyboard event that decide what it means. */
export interface Press {
	key: string;
	code: string;
	shiftKey: boolean;
	ctrlKey: boolean;
	altKey: boolean;
	metaKey: boolean;
}

/** How a key is written in a key map: "a", "space", "shift+backspace". */
export function keyName(press: Press): string {
	const name = press.code === 'Space' ? 'space' : press.key.toLowerCase();
	return press.shiftKey && name.length > 1 ? `shift+${name}` : name;
}

/**
 * What a key press means, or null. Digits are bound by their position, so that they work on every layout; letters by
 * the character printed. Shift with a letter is a letter of a tag (7B, A). Keys with Ctrl, Alt or Meta are the
 * browser's.
 */
export function meaningOf(press: Press, map: KeyMap): KeyMeaning | null {
	if (press.ctrlKey || press.altKey || press.metaKey) return null;
	const digit = /^(?:Digit|Numpad)(\d)$/.exec(press.code);
	if (digit) return { tag: digit[1]! };
	if (press.shiftKey && /^[a-z]$/i.test(press.key)) return { tag: press.key.toUpperCase() };
	const name = keyName(press);
	const command = commandWith(map.commands, name);
	if (command) return { do: command };
	const kind = ERROR_KINDS.find((candidate) => map.kinds[candidate] === name);
	return kind ? { score: kind } : null;
}

/** The kinds in the order of the number pad's keys: 1 to 9, and the next nine after the star. */
export interface PadPage {
	kinds: ErrorKind[];
	page: number;
}

export type PadMeaning = KeyMeaning | { page: number };

const PAD_COMMANDS: Record<string, Command> = {
	NumpadSubtract: 'take-back',
	NumpadAdd: 'control',
	NumpadDivide: 'afterdischarge',
	NumpadDecimal: 'blank'
};

/**
 * The second key map: the number pad alone, for one hand. While a trial waits for its score the digits are kinds and
 * Enter is intact; otherwise digits choose the tag and Enter shows the item. While the examiner is asked whether the
 * item was shown, plus and minus answer.
 */
export function padMeaningOf(press: Press, pad: PadPage, at: { waiting: boolean; asked: boolean }): PadMeaning | null {
	if (press.ctrlKey || press.altKey || press.metaKey) return null;
	if (at.asked && press.code === 'NumpadAdd') return { do: 'shown' };
	if (at.asked && press.code === 'NumpadSubtract') return { do: 'not-shown' };
	if (press.code === 'NumpadEnter') return { do: at.waiting ? 'intact' : 'show' };
	if (press.code === 'NumpadMultiply') return { page: (pad.page + 1) % Math.max(1, Math.ceil(pad.kinds.length / 9)) };
	const command = PAD_COMMANDS[press.code];
	if (command) return { do: command };
	const digit = /^Numpad(\d)$/.exec(press.code)?.[1];
	if (digit === undefined) return null;
	if (!at.waiting) return { tag: digit };
	const kind = digit === '0' ? undefined : pad.kinds[pad.page * 9 + Number(digit) - 1];
	return kind ? { score: kind } : null;
}
