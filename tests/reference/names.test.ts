import { createRequire } from 'node:module';
import { describe, expect, it } from 'vitest';
import { shippedSet } from '../unit/stimuli/shipped-sets';

const require = createRequire(import.meta.url);

/** German short names of characters in Unicode CLDR 48.2 (cldr-annotations-full). */
const cldr = (
	require('cldr-annotations-full/annotations/de/annotations.json') as {
		annotations: { annotations: Record<string, { tts?: string[] }> };
	}
).annotations.annotations;

/** Code points by picture name, as the icon package gives them: { '1f415': 'dog' }. */
const characters = Object.entries(require('@iconify-json/noto/chars.json') as Record<string, string>);

function cldrName(picture: string): string | undefined {
	const icon = picture.slice(picture.indexOf(':') + 1);
	const codes = characters.filter(([, name]) => name === icon).map(([code]) => code.replaceAll('-fe0f', ''));
	const names = codes.map((code) => cldr[String.fromCodePoint(...code.split('-').map((hex) => parseInt(hex, 16)))]);
	return names.find((name) => name?.tts !== undefined)?.tts?.[0];
}

/** CLDR names a character; these say what is drawn more closely than a person naming a thing does. */
const ALLOWED: Record<string, string> = {
	'obj-squirrel': 'Streifenhörnchen: a rare animal; the everyday word for such a picture is taken',
	'obj-apple': 'roter Apfel: adds the colour',
	'obj-mushroom': 'Fliegenpilz: names the kind',
	'obj-cheese': 'Käsestück: names the piece',
	'obj-tree': 'Laubbaum: names the kind',
	'obj-leaf': 'Ahornblatt: names the kind',
	'obj-moon': 'Mondsichel: names the shape',
	'obj-star': 'weißer mittelgroßer Stern: describes the drawing',
	'obj-train': 'Dampflokomotive: names the kind',
	'obj-shoe': 'Herrenschuh: names the kind',
	'obj-boot': 'Damenstiefel: names the kind',
	'obj-hat': 'Zylinder: names the kind',
	'obj-saw': 'Handsäge: names the kind',
	'obj-book': 'offenes Buch: adds that it is open',
	'obj-dice': 'Spielwürfel: names the use',
	'obj-hand': 'Hand mit gespreizten Fingern: describes the posture',
	'obj-whale': 'blasender Wal: adds that it spouts',
	'obj-corn': 'Maiskolben: names the cob',
	'obj-cake': 'Geburtstagskuchen: names the occasion; with cream and layers it is a Torte',
	'obj-truck': 'Sattelzug: names the kind',
	'obj-wheel': 'Autorad: names the kind; Rad alone is a bicycle too, and the tyre fills the picture',
	'obj-pants': 'Jeans: names the kind',
	'obj-backpack': 'Schulranzen: names the satchel',
	'obj-ball': 'Fußball: names the kind'
};

describe('German names of objects', () => {
	const { items } = shippedSet('objects-de');
	const differing = items.flatMap(({ id, answer, picture, note }) => {
		const name = cldrName(picture ?? '');
		return name === answer ? [] : [{ id, name, note }];
	});

	it('are those of CLDR, but for an allow-list with reasons', () => {
		const allowed = Object.entries(ALLOWED).map(([id, reason]) => `${id} ${reason.slice(0, reason.indexOf(':'))}`);
		expect(differing.map(({ id, name }) => `${id} ${name}`).sort()).toEqual(allowed.sort());
	});

	it('say in the table why they differ', () => {
		expect(differing.filter(({ note }) => !note?.includes('CLDR'))).toEqual([]);
		expect(differing.length).toBeLessThan(items.length / 5);
	});

	it('are bare nouns: one word with a capital, no article', () => {
		expect(items.filter(({ answer }) => !/^[A-ZÄÖÜ][a-zäöüß]*(-[A-Z][a-z]+)?$/.test(answer))).toEqual([]);
	});
});

describe('days and months', () => {
	// CLDR as Node's ICU carries it; 4 January 2021 was a Monday.
	const weekdays = (language: string) =>
		Array.from({ length: 7 }, (_, day) =>
			new Intl.DateTimeFormat(language, { weekday: 'long', timeZone: 'UTC' }).format(Date.UTC(2021, 0, 4 + day))
		);
	const months = (language: string) =>
		Array.from({ length: 12 }, (_, month) =>
			new Intl.DateTimeFormat(language, { month: 'long', timeZone: 'UTC' }).format(Date.UTC(2021, month, 1))
		);

	it.each(['en', 'de'])('in %s are those of CLDR, forwards and backwards', (language) => {
		const series = new Map(shippedSet(`series-${language}`).items.map(({ id, answer }) => [id, answer.split(', ')]));
		expect(series.get('ser-days')).toEqual(weekdays(language));
		expect(series.get('ser-days-back')).toEqual(weekdays(language).reverse());
		expect(series.get('ser-months')).toEqual(months(language));
		expect(series.get('ser-months-back')).toEqual(months(language).reverse());
	});

	it.each(['en', 'de'])('count in %s up, back and in steps with the same words', (language) => {
		const series = new Map(shippedSet(`series-${language}`).items.map(({ id, answer }) => [id, answer.split(', ')]));
		const up = series.get('ser-count-up') ?? [];
		expect(new Set(up).size).toBe(20);
		expect(series.get('ser-count-back')).toEqual(up.toReversed());
		expect(series.get('ser-count-twos')).toEqual(up.filter((_, at) => at % 2 === 1));
		expect(series.get('ser-count-tens')?.slice(0, 2)).toEqual([up[9], up[19]]);
		expect(series.get('ser-count-tens')).toHaveLength(10);
		expect(series.get('ser-alphabet')?.join('')).toBe('ABCDEFGHIJKLMNOPQRSTUVWXYZ');
	});
});
