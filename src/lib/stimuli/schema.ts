import { z } from 'zod';

/**
 * The item-set format: one folder a set, `datapackage.json` (Data Package standard, datapackage.org, version 2.0) and
 * `items.csv` (RFC 4180, UTF-8, header). stimuli/README.md says what each column means.
 */

/** The columns of items.csv, in order, as the Table Schema fields that datapackage.json has to give. */
export const ITEM_FIELDS = [
	{ name: 'id', type: 'string', constraints: { required: true, unique: true } },
	{ name: 'answer', type: 'string', constraints: { required: true } },
	{ name: 'accepted', type: 'string' },
	{ name: 'text', type: 'string' },
	{ name: 'picture', type: 'string' },
	{ name: 'spoken', type: 'string' },
	{ name: 'sound', type: 'string' },
	{ name: 'licence', type: 'string', constraints: { required: true } },
	{ name: 'attribution', type: 'string' },
	{ name: 'category', type: 'string' },
	{ name: 'syllables', type: 'integer' },
	{ name: 'zipf', type: 'number' },
	{ name: 'note', type: 'string' }
] as const;

export const COLUMNS = ITEM_FIELDS.map((field) => field.name);
export type Column = (typeof ITEM_FIELDS)[number]['name'];

const kebab = /^[a-z][a-z0-9]*(-[a-z0-9]+)*$/;

/** `package:icon` out of an icon package, or a picture file in the set's own folder. */
const pictureReference = /^(@[a-z0-9-]+\/[a-z0-9.-]+:[a-z0-9-]+|media\/[\w-]+\.(svg|png|jpe?g|webp))$/;

const optional = z
	.string()
	.trim()
	.transform((cell) => cell || null);

const list = z.string().transform((cell) =>
	cell
		.split(';')
		.map((part) => part.trim())
		.filter((part) => part !== '')
);

function numberCell(pattern: RegExp, what: string) {
	return z
		.string()
		.trim()
		.refine((cell) => cell === '' || pattern.test(cell), { error: `is not ${what}` })
		.transform((cell) => (cell === '' ? null : Number(cell)));
}

function reference(pattern: RegExp, what: string) {
	return optional.refine((cell) => cell === null || pattern.test(cell), { error: `is not ${what}` });
}

/** One row of items.csv: strings in, an item out. */
export const itemSchema = z
	.object({
		id: z.string().regex(kebab, { error: 'is not an id in kebab case, as obj-dog' }),
		answer: z.string().trim().min(1, { error: 'is empty' }),
		accepted: list,
		text: optional,
		picture: reference(pictureReference, 'package:name or media/file.svg'),
		spoken: optional,
		sound: reference(/^flite:rms$/, 'a known voice (flite:rms)'),
		licence: z.string().trim().min(1, { error: 'is empty' }),
		attribution: optional,
		category: optional,
		syllables: numberCell(/^[1-9]\d?$/, 'a whole number from 1 to 99'),
		zipf: numberCell(/^[0-7]\.\d{1,3}$/, 'a Zipf value as 4.374'),
		note: optional
	} satisfies Record<Column, z.ZodType>)
	.superRefine((item, context) => {
		const add = (column: Column, message: string) =>
			context.addIssue({ code: 'custom', path: [column], message, input: item[column] });
		if (item.text === null && item.picture === null && item.sound === null)
			add('picture', 'is empty, and so are text and sound: the patient would have no prompt');
		if (item.sound !== null && item.spoken === null) add('spoken', 'is empty, but sound names a voice');
		if (item.sound === null && item.spoken !== null) add('sound', 'is empty, but spoken has words for a voice');
		if (item.accepted.includes(item.answer)) add('accepted', `repeats the answer "${item.answer}"`);
		if (new Set(item.accepted).size < item.accepted.length) add('accepted', 'has one answer twice');
	});

/** One item of a set as its table gives it. */
export type SetItem = z.infer<typeof itemSchema>;

const licence = z.object({ name: z.string().min(1), title: z.string().min(1), path: z.string().optional() });
export type Licence = z.infer<typeof licence>;

function isLanguageTag(tag: string): boolean {
	try {
		return Intl.getCanonicalLocales(tag)[0] === tag;
	} catch {
		return false;
	}
}

/** What datapackage.json says of the set; other properties of the standard are let through unread. */
export const packageSchema = z.object({
	name: z.string().regex(kebab, { error: 'is not in kebab case' }),
	version: z.string().regex(/^\d+\.\d+\.\d+$/, { error: 'is not a version as 1.0.0' }),
	title: z.string().min(1),
	description: z.string().min(1),
	licenses: z.array(licence).min(1, { error: 'names no licence' }),
	contributors: z.array(z.object({ title: z.string().min(1) })).min(1, { error: 'names nobody' }),
	task: z.string().regex(kebab, { error: 'is not a task in kebab case, as object-naming' }),
	language: z.string().refine(isLanguageTag, { error: 'is not a language tag (BCP 47), as en or de-AT' }),
	leadIn: z.string().min(1).nullable(),
	norms: z.literal('none', { error: 'must be "none": no other norms are defined by this format yet' }),
	resources: z.tuple(
		[
			z.object({
				name: z.literal('items'),
				path: z.literal('items.csv'),
				schema: z.object({ fields: z.array(z.object({ name: z.string(), type: z.string() })) })
			})
		],
		{ error: 'must list one resource, items' }
	)
});

/** A set as read from its folder. */
export interface ItemSet {
	id: string;
	version: string;
	title: string;
	description: string;
	task: string;
	/** BCP 47 */
	language: string;
	/** said by the patient before the answer, or null */
	leadIn: string | null;
	norms: 'none';
	licences: Licence[];
	items: SetItem[];
}
