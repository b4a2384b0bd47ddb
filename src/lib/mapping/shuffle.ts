/**
 * A random order that the same seed gives again: Fisher and Yates, driven by the generator "mulberry32"
 * (T. Ettinger, public domain), whose 32 bits of state are ample for the order of a few hundred items.
 */
export function shuffle<T>(values: readonly T[], seed: number): T[] {
	const result = [...values];
	const random = mulberry32(seed);
	for (let i = result.length - 1; i > 0; i--) {
		const j = Math.floor(random() * (i + 1));
		[result[i], result[j]] = [result[j] as T, result[i] as T];
	}
	return result;
}

function mulberry32(seed: number): () => number {
	let state = seed >>> 0;
	return () => {
		state = (state + 0x6d2b79f5) >>> 0;
		let mixed = Math.imul(state ^ (state >>> 15), state | 1);
		mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61);
		return ((mixed ^ (mixed >>> 14)) >>> 0) / 4294967296;
	};
}
