import { mkdir, mkdtemp, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { ItemSetError, readSet } from '../../../src/lib/stimuli/read-set';
import { COLUMNS, ITEM_FIELDS } from '../../../src/lib/stimuli/schema';

let root: string;
let folder: string;

const HEADER = COLUMNS.join(',');
const DOG = 'obj-dog,dog,hound;puppy,,@iconify-json/noto:dog,,,CC0-1.0,,animal,1,5.285,';
const described = {
	name: 'my-set',
	version: '1.0.0',
	title: 'Mine',
	description: 'A set for a test.',
	licenses: [{ name: 'CC0-1.0', title: 'Creative Commons Zero 1.0' }],
	contributors: [{ title: 'A clinic' }],
	task: 'object-naming',
	language: 'de-AT',
	leadIn: 'Das ist',
	norms: 'none',
	resources: [{ name: 'items', path: 'items.csv', schema: { fields: ITEM_FIELDS } }]
};

async function write(rows: string[], changed: object = {}, header = HEADER): Promise<void> {
	await writeFile(join(folder, 'datapackage.json'), JSON.stringify({ ...described, ...changed }));
	await writeFile(join(folder, 'items.csv'), [header, ...rows].join('\r\n') + '\r\n');
}

async function problems(): Promise<string[]> {
	const error = await readSet(folder).catch((thrown: unknown) => thrown);
	if (!(error instanceof ItemSetError)) throw new Error(`expected problems, not ${String(error)}`);
	return error.problems.map((problem) => problem.replace(`${folder}/`, ''));
}

beforeEach(async () => {
	root = await mkdtemp(join(tmpdir(), 'set-'));
	folder = join(root, 'my-set');
	await mkdir(folder);
});
afterEach(() => rm(root, { recursive: true }));

describe('readSet', () => {
	it('reads the description and the items', async () => {
		await write([DOG, 'obj-owl,"owl, or ""hooter""",,,media/owl.png,,,CC0-1.0,,,,,']);
		const set = await readSet(folder);
		expect(set).toMatchObject({ id: 'my-set', version: '1.0.0', language: 'de-AT', leadIn: 'Das ist', norms: 'none' });
		expect(set.items[0]).toEqual({
			id: 'obj-dog',
			answer: 'dog',
			accepted: ['hound', 'puppy'],
			text: null,
			picture: '@iconify-json/noto:dog',
			spoken: null,
			sound: null,
			licence: 'CC0-1.0',
			attribution: null,
			category: 'animal',
			syllables: 1,
			zipf: 5.285,
			note: null
		});
		expect(set.items[1]).toMatchObject({ answer: 'owl, or "hooter"', accepted: [], picture: 'media/owl.png' });
	});

	it.each([
		[
			'Obj Dog,dog,,,@iconify-json/noto:dog,,,CC0-1.0,,,,,',
			'column id: "Obj Dog" is not an id in kebab case, as obj-dog'
		],
		['obj-dog,,,,@iconify-json/noto:dog,,,CC0-1.0,,,,,', 'column answer: is empty'],
		['obj-dog,dog,dog,,@iconify-json/noto:dog,,,CC0-1.0,,,,,', 'column accepted: "dog" repeats the answer "dog"'],
		['obj-dog,dog,pup;pup,,@iconify-json/noto:dog,,,CC0-1.0,,,,,', 'column accepted: "pup;pup" has one answer twice'],
		['obj-dog,dog,,,../dog.png,,,CC0-1.0,,,,,', 'column picture: "../dog.png" is not package:name or media/file.svg'],
		[
			'obj-dog,dog,,,,,,CC0-1.0,,,,,',
			'column picture: is empty, and so are text and sound: the patient would have no prompt'
		],
		['obj-dog,dog,,,,dog,,CC0-1.0,,,,,', 'column sound: is empty, but spoken has words for a voice'],
		['obj-dog,dog,,,,,flite:rms,CC0-1.0,,,,,', 'column spoken: is empty, but sound names a voice'],
		['obj-dog,dog,,,,dog,flite:kal,CC0-1.0,,,,,', 'column sound: "flite:kal" is not a known voice (flite:rms)'],
		[
			'obj-dog,dog,,,@iconify-json/noto:dog,,,MIT,,,,,',
			'column licence: "MIT" is not among the licenses of datapackage.json'
		],
		[
			'obj-dog,dog,,,@iconify-json/noto:dog,,,CC0-1.0,,,one,,',
			'column syllables: "one" is not a whole number from 1 to 99'
		],
		['obj-dog,dog,,,@iconify-json/noto:dog,,,CC0-1.0,,,,"5,28",', 'column zipf: "5,28" is not a Zipf value as 4.374']
	])('names row and column of %s', async (row, problem) => {
		await write(['obj-cat,cat,,,@iconify-json/noto:cat,,,CC0-1.0,,,,,', row]);
		expect(await problems()).toContain(`items.csv, row 3, ${problem}`);
	});

	it('names every problem at once', async () => {
		await write([DOG, DOG, 'obj-cat,,,,@iconify-json/noto:cat,,,CC0-1.0,,,x,,', 'obj-owl,owl']);
		expect(await problems()).toEqual([
			'items.csv, row 3, column id: "obj-dog" is in row 2 already',
			'items.csv, row 4, column answer: is empty',
			'items.csv, row 4, column syllables: "x" is not a whole number from 1 to 99',
			'items.csv, row 5: has 2 columns, not 13'
		]);
	});

	it('refuses other columns, no items and a broken table', async () => {
		await write([DOG], {}, HEADER.replace('answer', 'name'));
		expect(await problems()).toEqual([`items.csv, row 1: the columns must be ${HEADER}`]);
		await write([]);
		expect(await problems()).toEqual(['items.csv: has no items']);
		await write(['obj-dog,"dog']);
		expect(await problems()).toEqual([expect.stringMatching(/^items\.csv: is not a table by RFC 4180/)]);
	});

	it('refuses a file that is missing or not UTF-8', async () => {
		expect(await problems()).toEqual(['datapackage.json: cannot be read (ENOENT)']);
		await write([DOG]);
		await writeFile(join(folder, 'items.csv'), Buffer.from([0x4c, 0xf6, 0x77, 0x65]));
		expect(await problems()).toEqual(['items.csv: is not UTF-8']);
	});

	it.each([
		[{ name: 'other' }, 'name: is "other", but the folder is "my-set"'],
		[{ version: '1' }, 'version: is not a version as 1.0.0'],
		[{ language: 'de_AT' }, 'language: is not a language tag (BCP 47), as en or de-AT'],
		[{ language: 'DE' }, 'language: is not a language tag (BCP 47), as en or de-AT'],
		[{ task: 'Object naming' }, 'task: is not a task in kebab case, as object-naming'],
		[{ norms: 'good' }, 'norms: must be "none": no other norms are defined by this format yet'],
		[{ licenses: [] }, 'licenses: names no licence'],
		[{ resources: [] }, 'resources: must list one resource, items']
	])('names the property of datapackage.json in %o', async (changed, problem) => {
		await write([DOG], changed);
		expect(await problems()).toEqual([`datapackage.json, ${problem}`]);
	});

	it('wants the columns declared as they are', async () => {
		const resources = [{ name: 'items', path: 'items.csv', schema: { fields: ITEM_FIELDS.slice(1) } }];
		await write([DOG], { resources });
		expect(await problems()).toEqual([
			expect.stringMatching(/^datapackage\.json, resources\.0\.schema\.fields: must be id/)
		]);
	});
});
