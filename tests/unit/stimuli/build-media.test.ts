import { createHash } from 'node:crypto';
import { mkdir, mkdtemp, readFile, readdir, rm, stat, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, expect, it } from 'vitest';
import { buildMedia, type SetProgress } from '../../../src/lib/server/media/build-media';
import { COLUMNS, ITEM_FIELDS } from '../../../src/lib/stimuli/schema';

let root: string;
let sets: string;
let folder: string;

const DOG = 'obj-dog,dog,,,@iconify-json/noto:dog,,,CC0-1.0,,,,,';
const CAT = 'rep-cat,cat,,,,cat,flite:rms,CC0-1.0,,,,,';
const OWN = 'own-dot,dot,,,media/dot.svg,,,CC0-1.0,,,,,';

async function writeSet(rows: string[]): Promise<void> {
	const described = {
		name: 'mixed',
		version: '1.0.0',
		title: 'Mixed',
		description: 'A set for a test.',
		licenses: [{ name: 'CC0-1.0', title: 'Creative Commons Zero 1.0' }],
		contributors: [{ title: 'A clinic' }],
		task: 'object-naming',
		language: 'en',
		leadIn: null,
		norms: 'none',
		resources: [{ name: 'items', path: 'items.csv', schema: { fields: ITEM_FIELDS } }]
	};
	await writeFile(join(sets, 'mixed', 'datapackage.json'), JSON.stringify(described));
	await writeFile(join(sets, 'mixed', 'items.csv'), [COLUMNS.join(), ...rows].join('\r\n'));
}

const drawDot = (radius: number) =>
	writeFile(
		join(sets, 'mixed', 'media', 'dot.svg'),
		`<svg xmlns="http://www.w3.org/2000/svg" width="64" height="64"><ellipse cx="32" cy="32" rx="${radius}" ry="9"/></svg>`
	);

async function build() {
	const progress: SetProgress[] = [];
	const catalogue = await buildMedia(sets, folder, (done) => progress.push(done));
	return { catalogue, made: progress.map(({ drawn, rendered }) => [drawn, rendered]) };
}

beforeEach(async () => {
	root = await mkdtemp(join(tmpdir(), 'media-'));
	[sets, folder] = [join(root, 'sets'), join(root, 'media')];
	await mkdir(join(sets, 'mixed', 'media'), { recursive: true });
	await drawDot(20);
});
afterEach(() => rm(root, { recursive: true }));

it('stores every file under the SHA-256 of its content and lists it in the catalogue', async () => {
	await writeSet([DOG, CAT, OWN]);
	const { catalogue, made } = await build();
	expect(made).toEqual([[2, 1]]);
	const media = (await readdir(folder)).filter((file) => !file.endsWith('.json')).sort();
	expect(media.map((file) => file.split('.')[1])).toHaveLength(5);
	for (const file of media) {
		const hash = createHash('sha256').update(await readFile(join(folder, file)));
		expect(file.split('.')[0]).toBe(hash.digest('hex').slice(0, 32));
	}
	const prompts = catalogue.sets.flatMap(({ items }) => items.flatMap((item) => item.prompts));
	const listed = prompts.flatMap((prompt) =>
		prompt.kind === 'picture' ? prompt.files.map(({ file }) => file) : prompt.kind === 'sound' ? [prompt.file] : []
	);
	expect(listed.sort()).toEqual(media);
	expect(JSON.parse(await readFile(join(folder, 'catalogue.json'), 'utf8'))).toEqual(catalogue);
});

it('does nothing the second time, and only what is new after a change', async () => {
	await writeSet([DOG, CAT, OWN]);
	await build();
	const written = (await stat(join(folder, 'catalogue.json'))).mtimeMs;
	expect((await build()).made).toEqual([[0, 0]]);
	expect((await stat(join(folder, 'catalogue.json'))).mtimeMs).toBe(written);

	await writeSet([DOG.replace(',dog,', ',hound,'), CAT, CAT.replaceAll('cat', 'hen'), OWN]);
	const renamed = await build();
	expect(renamed.made).toEqual([[0, 1]]);
	expect(renamed.catalogue.sets[0]?.items[0]?.answer).toBe('hound');

	await drawDot(30);
	expect((await build()).made).toEqual([[1, 0]]);
});

it('makes again what was deleted', async () => {
	await writeSet([CAT]);
	const { catalogue } = await build();
	const sound = (await readdir(folder)).find((file) => file.endsWith('.wav')) ?? '';
	await rm(join(folder, sound));
	const again = await build();
	expect(again.made).toEqual([[0, 1]]);
	expect(again.catalogue).toEqual(catalogue);
});

it.each([
	[DOG.replace('noto:dog', 'noto:dogg'), 'mixed, obj-dog: @iconify-json/noto has no picture dogg'],
	[DOG.replace('noto:dog', 'absent:dog'), 'mixed, obj-dog: the package @iconify-json/absent is not installed'],
	[OWN.replace('dot.svg', 'dash.svg'), 'mixed, own-dot: ']
])('names set and item of %s', async (row, message) => {
	await writeSet([row]);
	await expect(build()).rejects.toThrow(message);
});
