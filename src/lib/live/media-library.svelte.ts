import { bestFile } from '$lib/stimuli/item-size';
import { MediaCache } from './media-cache';
import type { SoundOutput } from './sound-output';

type PictureFiles = { file: string; width: number }[];

interface Wanted {
	pictures: PictureFiles[];
	sounds: string[];
}

const AT_ONCE = 4;
const FIRST_WAIT = 500;
const LONGEST_WAIT = 8000;

/** The pictures and sounds of a case, loaded and decoded ahead, so that a run needs neither network nor server. */
export class MediaLibrary {
	/** loaded and decoded, of how many */
	ready = $state(0);
	total = $state(0);
	/** whether the case has anything to listen to; null before the first list */
	hasSounds = $state<boolean | null>(null);

	#cache: MediaCache;
	#wanted: Wanted = { pictures: [], sounds: [] };
	#round = 0;
	#side: () => number;

	/**
	 * @param output asked for when the first sound is to be decoded
	 * @param side in CSS pixels, at which pictures will be shown
	 */
	constructor(output: () => Promise<SoundOutput>, side: () => number) {
		this.#cache = new MediaCache(output);
		this.#side = side;
	}

	/** Loads what the case has now; goes on trying until everything is there or `load` or `stop` is called. */
	async load(): Promise<void> {
		const round = ++this.#round;
		for (let wait = FIRST_WAIT; round === this.#round; wait = Math.min(LONGEST_WAIT, wait * 2)) {
			try {
				if (await this.#loadRound(round)) return;
			} catch {
				// Not reached: the count says what is missing, and it is tried again.
			}
			await new Promise((done) => setTimeout(done, wait));
		}
	}

	stop(): void {
		this.#round++;
		this.#cache.clear();
	}

	/** The address of a picture on this device: the best file, or another one of it that is here already. */
	async picture(files: PictureFiles): Promise<string> {
		const best = this.#best(files);
		const here = [best, ...files.map(({ file }) => file)].find((file) => this.#cache.has(file));
		return await this.#cache.picture(here ?? best);
	}

	async sound(file: string): Promise<AudioBuffer> {
		return await this.#cache.sound(file);
	}

	/** A word of the case, to try the loudspeaker with; null when it has none or none is here yet. */
	async anySound(): Promise<AudioBuffer | null> {
		const file = this.#wanted.sounds.find((one) => this.#cache.has(one));
		return file === undefined ? null : await this.#cache.sound(file);
	}

	#best(files: PictureFiles): string {
		return bestFile(files, this.#side(), devicePixelRatio);
	}

	/** True when nothing is missing any more, or a newer round has begun. */
	async #loadRound(round: number): Promise<boolean> {
		const response = await fetch('/api/patient/items', { cache: 'no-store' });
		if (!response.ok) return false;
		const wanted = (await response.json()) as Wanted;
		if (round !== this.#round) return true;
		this.#wanted = wanted;
		this.hasSounds = wanted.sounds.length > 0;
		this.#count();
		const work = [
			...wanted.pictures.map((files) => () => this.#cache.picture(this.#best(files))),
			...wanted.sounds.map((file) => () => this.#cache.sound(file))
		];
		const failed = await inTurn(work, AT_ONCE, () => {
			if (round === this.#round) this.#count();
			return round === this.#round;
		});
		return failed === 0;
	}

	#count(): void {
		const { pictures, sounds } = this.#wanted;
		const pictureHere = (files: PictureFiles) => files.some(({ file }) => this.#cache.has(file));
		this.total = pictures.length + sounds.length;
		this.ready = pictures.filter(pictureHere).length + sounds.filter((file) => this.#cache.has(file)).length;
	}
}

/** Works through a list, some at once; `goOn` is asked after each. Says how many failed. */
async function inTurn(work: (() => Promise<unknown>)[], atOnce: number, goOn: () => boolean): Promise<number> {
	const left = work.values();
	let failed = 0;
	const worker = async () => {
		for (const one of left) {
			await one().catch(() => failed++);
			if (!goOn()) return;
		}
	};
	await Promise.all(Array.from({ length: atOnce }, worker));
	return failed;
}
