import { languageName } from './trade';

/** One language to choose, by its name in English (Unicode's data). */
export interface LanguageOption {
	tag: string;
	name: string;
}

const A = 97;
const LETTERS = Array.from({ length: 26 }, (_, i) => String.fromCharCode(A + i));

/** Forms that differ enough for items of their own; any other one can be typed as its tag. */
const REGIONAL = [
	'de-AT',
	'de-CH',
	'en-GB',
	'en-US',
	'es-419',
	'es-ES',
	'fr-CA',
	'nl-BE',
	'pt-BR',
	'pt-PT',
	'zh-Hans',
	'zh-Hant'
];

let known: LanguageOption[] | undefined;

/** Every language with a tag of two letters, by name; made once. */
export function allLanguages(): LanguageOption[] {
	if (known) return known;
	const names = new Intl.DisplayNames(['en'], { type: 'language', fallback: 'none' });
	const tags = new Set<string>(REGIONAL);
	for (const first of LETTERS) {
		for (const second of LETTERS) {
			const [tag] = Intl.getCanonicalLocales(first + second);
			if (tag && names.of(tag)) tags.add(tag);
		}
	}
	known = [...tags].map((tag) => ({ tag, name: languageName(tag) })).sort((a, b) => a.name.localeCompare(b.name, 'en'));
	return known;
}

/**
 * The languages a text may mean: names that begin with it, then names that contain it, and the tag itself where the
 * text is one.
 */
export function findLanguages(text: string, leaveOut: readonly string[] = []): LanguageOption[] {
	const sought = text.trim().toLowerCase();
	const open = allLanguages().filter(({ tag }) => !leaveOut.includes(tag));
	if (sought === '') return open;
	const typed = languageOf(text.trim());
	const begins = open.filter(({ name }) => name.toLowerCase().startsWith(sought));
	const contains = open.filter(
		({ name }) => !begins.some((b) => b.name === name) && name.toLowerCase().includes(sought)
	);
	const found = [...begins, ...contains];
	if (!typed || leaveOut.includes(typed.tag)) return found;
	return [typed, ...found.filter(({ tag }) => tag !== typed.tag)];
}

const TAG = /^[A-Za-z]{2,3}(-[A-Za-z0-9]{2,8})*$/;

/** The language of a tag that has a name; null for any other text. */
function languageOf(text: string): LanguageOption | null {
	if (!TAG.test(text)) return null;
	try {
		const [tag] = Intl.getCanonicalLocales(text);
		if (!tag) return null;
		const name = new Intl.DisplayNames(['en'], { type: 'language', fallback: 'none' }).of(tag);
		return name ? { tag, name } : null;
	} catch {
		// Not a tag by BCP 47, although it looks like one.
		return null;
	}
}
