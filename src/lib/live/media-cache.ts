import type { SoundOutput } from './sound-output';

/** Media files loaded and decoded, each once; what failed is forgotten, so that it can be tried again. */
export class MediaCache {
	#pictures = new Map<string, Promise<string>>();
	#sounds = new Map<string, Promise<AudioBuffer>>();
	#here = new Set<string>();
	#output: () => Promise<SoundOutput>;

	/** @param output asked for when the first sound is to be decoded */
	constructor(output: () => Promise<SoundOutput>) {
		this.#output = output;
	}

	/** Whether a file is loaded and decoded. */
	has(file: string): boolean {
		return this.#here.has(file);
	}

	/** The address of a picture on this device. */
	async picture(file: string): Promise<string> {
		return await once(this.#pictures, file, async () => {
			const address = URL.createObjectURL(await (await fetchMedia(file)).blob());
			const image = new Image();
			image.src = address;
			await image.decode();
			this.#here.add(file);
			return address;
		});
	}

	async sound(file: string): Promise<AudioBuffer> {
		return await once(this.#sounds, file, async () => {
			const output = await this.#output();
			const buffer = await output.decode(await (await fetchMedia(file)).arrayBuffer());
			this.#here.add(file);
			return buffer;
		});
	}

	/** Gives the memory back. */
	clear(): void {
		for (const picture of this.#pictures.values()) {
			picture.then(
				(address) => URL.revokeObjectURL(address),
				() => undefined
			);
		}
		this.#pictures.clear();
		this.#sounds.clear();
		this.#here.clear();
	}
}

async function fetchMedia(file: string): Promise<Response> {
	const response = await fetch(`/media/${encodeURIComponent(file)}`);
	if (!response.ok) throw new Error(`${file}: ${response.status}`);
	return response;
}

function once<T>(known: Map<string, Promise<T>>, file: string, load: () => Promise<T>): Promise<T> {
	const loading = known.get(file) ?? load();
	known.set(file, loading);
	loading.catch(() => known.delete(file));
	return loading;
}
