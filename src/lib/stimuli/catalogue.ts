import type { CaseItem, EventData, Prompt } from '../mapping/events';
import type { ItemSet, Licence, SetItem } from './schema';

/** One item of a built set: what a case copies, and what a therapist chooses by. */
export interface CatalogueItem extends CaseItem {
	/** null: not known */
	syllables: number | null;
	/** log10 of the uses in a billion words of film subtitles; null: not known */
	zipf: number | null;
	licence: string;
	/** whom to credit where the item is shown to staff, or null */
	attribution: string | null;
	note: string | null;
}

/** One item set with its media built. */
export interface CatalogueSet {
	id: string;
	version: string;
	title: string;
	description: string;
	task: string;
	language: string;
	leadIn: string | null;
	norms: 'none';
	licences: Licence[];
	/** every credit of its items, each once */
	attribution: string[];
	items: CatalogueItem[];
}

/** All sets, as `catalogue.json` beside the media holds them. */
export interface Catalogue {
	sets: CatalogueSet[];
}

/** Where the drawn pictures and rendered sounds of a set are. */
export interface BuiltMedia {
	/** file names with their widths in pixels, smallest first */
	picture(reference: string): { file: string; width: number }[];
	/** file name and duration in seconds */
	sound(voice: string, spoken: string): { file: string; duration: number };
}

function prompts(item: SetItem, media: BuiltMedia): Prompt[] {
	const made: Prompt[] = [];
	if (item.picture !== null) {
		const credit = item.attribution === null ? {} : { attribution: item.attribution };
		made.push({ kind: 'picture', files: media.picture(item.picture), ...credit });
	}
	if (item.text !== null) made.push({ kind: 'text', text: item.text });
	if (item.sound !== null && item.spoken !== null)
		made.push({ kind: 'sound', ...media.sound(item.sound, item.spoken) });
	return made;
}

/** A set and its built media as the catalogue lists them. */
export function catalogueSet(set: ItemSet, media: BuiltMedia): CatalogueSet {
	const items = set.items.map((item) => ({
		id: item.id,
		answer: item.answer,
		accepted: item.accepted,
		prompts: prompts(item, media),
		...(item.category === null ? {} : { category: item.category }),
		syllables: item.syllables,
		zipf: item.zipf,
		licence: item.licence,
		attribution: item.attribution,
		note: item.note
	}));
	const credits = items.flatMap(({ attribution }) => (attribution === null ? [] : [attribution]));
	return {
		id: set.id,
		version: set.version,
		title: set.title,
		description: set.description,
		task: set.task,
		language: set.language,
		leadIn: set.leadIn,
		norms: set.norms,
		licences: set.licences,
		attribution: [...new Set(credits)],
		items
	};
}

/** An item of the catalogue as a case keeps it. */
export function caseItem(item: CatalogueItem): CaseItem {
	const { id, answer, accepted, prompts, category } = item;
	return { id, answer, accepted, prompts, ...(category === undefined ? {} : { category }) };
}

/**
 * The case log's entry for a set, or for the part of it that `chosen` names, in the set's order.
 * @throws RangeError for an item that the set does not have
 */
export function copyForCase(set: CatalogueSet, chosen?: string[]): EventData['items-copied'] {
	const missing = chosen?.find((id) => !set.items.some((item) => item.id === id));
	if (missing !== undefined) throw new RangeError(`${set.id} has no item ${missing}`);
	const { version, task, language, leadIn } = set;
	const items = set.items.filter((item) => chosen === undefined || chosen.includes(item.id)).map(caseItem);
	return { set: set.id, version, task, language, leadIn, items };
}
