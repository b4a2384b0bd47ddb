import { createHash, randomUUID } from 'node:crypto';
import { mkdir, readFile, readdir, rename, writeFile } from 'node:fs/promises';
import { join } from 'node:path';

/** The files of one picture, smallest first, with their widths in pixels. */
export interface BuiltPicture {
	files: { file: string; width: number }[];
}

/** The file of one sound and its duration in seconds. */
export interface BuiltSound {
	file: string;
	duration: number;
}

type Built = BuiltPicture | BuiltSound;

const INDEX = 'index.json';

/**
 * A folder of media files under content-addressed names, with an index from what each was built of to its files.
 * Every file is written beside its name and moved there, so that two builds at once cannot harm each other.
 */
export class MediaFolder {
	#made = false;

	private constructor(
		readonly folder: string,
		readonly index: Map<string, Built>,
		readonly present: Set<string>
	) {}

	/** Opens a folder, or begins one; entries whose files are gone are forgotten. */
	static async open(folder: string): Promise<MediaFolder> {
		await mkdir(folder, { recursive: true });
		const present = new Set(await readdir(folder));
		const index = new Map<string, Built>();
		if (present.has(INDEX)) {
			const entries = JSON.parse(await readFile(join(folder, INDEX), 'utf8')) as Record<string, Built>;
			for (const [key, built] of Object.entries(entries)) {
				const files = 'files' in built ? built.files : [built];
				if (files.every(({ file }) => present.has(file))) index.set(key, built);
			}
		}
		return new MediaFolder(folder, index, present);
	}

	/** Stores a file as the first 32 hex digits of its SHA-256 and the extension; gives the name. */
	async add(content: Buffer, extension: 'webp' | 'wav'): Promise<string> {
		const file = `${createHash('sha256').update(content).digest('hex').slice(0, 32)}.${extension}`;
		if (!this.present.has(file)) await this.#write(file, content);
		this.present.add(file);
		return file;
	}

	/** What `key` was built into; `build` makes it when it was not. */
	async remember<T extends Built>(key: string, build: () => Promise<T>): Promise<T> {
		const known = this.index.get(key);
		if (known !== undefined) return known as T;
		const built = await build();
		this.index.set(key, built);
		this.#made = true;
		return built;
	}

	/** Writes the index when something was built. */
	async close(): Promise<void> {
		if (this.#made) await this.#write(INDEX, JSON.stringify(Object.fromEntries(this.index)));
	}

	/** Writes a text file of the folder unless it says the same already; true when it was written. */
	async replace(file: string, text: string): Promise<boolean> {
		if (this.present.has(file) && (await readFile(join(this.folder, file), 'utf8')) === text) return false;
		await this.#write(file, text);
		return true;
	}

	async #write(file: string, content: Buffer | string): Promise<void> {
		const beside = join(this.folder, `.${file}.${randomUUID()}`);
		await writeFile(beside, content);
		await rename(beside, join(this.folder, file));
	}
}
