import { createHash } from 'node:crypto';
import { readFile } from 'node:fs/promises';
import { join } from 'node:path';
import sharp from 'sharp';
import { beforeAll, describe, expect, it } from 'vitest';
import { buildMedia } from '../../src/lib/server/media/build-media';
import { drawPicture, inkBox } from '../../src/lib/server/media/draw-picture';
import { readPicture } from '../../src/lib/server/media/picture-source';
import { decodeWav } from '../../src/lib/server/media/wav';
import type { Catalogue } from '../../src/lib/stimuli/catalogue';
import { shippedSets, STIMULI } from '../unit/stimuli/shipped-sets';

/** The ground of the patient view. */
const GROUND = [0xd5, 0xd9, 0xde] as const;
const MEDIA = '.media';

/** CIE 1976 L*a*b* of an sRGB colour, white point D65 (IEC 61966-2-1, CIE 15). */
function lab(rgb: readonly [number, number, number]): [number, number, number] {
	const [r, g, b] = rgb.map((value) => {
		const share = value / 255;
		return share <= 0.04045 ? share / 12.92 : ((share + 0.055) / 1.055) ** 2.4;
	}) as [number, number, number];
	const f = (t: number) => (t > 216 / 24389 ? Math.cbrt(t) : ((24389 / 27) * t + 16) / 116);
	const x = f((0.4124 * r + 0.3576 * g + 0.1805 * b) / 0.9505);
	const y = f(0.2126 * r + 0.7152 * g + 0.0722 * b);
	const z = f((0.0193 * r + 0.1192 * g + 0.9505 * b) / 1.089);
	return [116 * y - 16, 500 * (x - y), 200 * (y - z)];
}

/** Mean colour difference (CIE76) of a picture's ink from the ground: 2.3 is just noticeable (Mahy et al. 1994). */
async function differenceFromGround(webp: Buffer): Promise<number> {
	const pixels = await sharp(webp).resize(64, 64).ensureAlpha().raw().toBuffer();
	const ground = lab(GROUND);
	const differences: number[] = [];
	for (let at = 0; at < pixels.length; at += 4) {
		const [r = 0, g = 0, b = 0, alpha = 0] = pixels.subarray(at, at + 4);
		if (alpha < 128) continue;
		const [l, a, c] = lab([r, g, b]);
		differences.push(Math.hypot(l - ground[0], a - ground[1], c - ground[2]));
	}
	return differences.reduce((sum, difference) => sum + difference, 0) / differences.length;
}

/**
 * By eye at 300 pixels, cloud, tooth, swan, rabbit and spoon (5.9 to 10.2) were too pale, the elephant (12.9) was not: our
 * own judgement, no source.
 */
const PALE = 12;

let catalogue: Catalogue;
beforeAll(async () => {
	// What `npm run media` has built already is not built again.
	catalogue = await buildMedia(STIMULI, MEDIA);
}, 180_000);

const media = (file: string) => readFile(join(MEDIA, file));
const items = () => catalogue.sets.flatMap(({ id, items }) => items.map((item) => ({ set: id, ...item })));
const pictureFiles = () =>
	items().flatMap(({ id, prompts }) =>
		prompts.flatMap((prompt) => (prompt.kind === 'picture' ? prompt.files.map((file) => ({ id, ...file })) : []))
	);

describe('the pictures', () => {
	it('are sources without text, script or anything from outside', async () => {
		const references = new Set(shippedSets.flatMap((set) => set.items.flatMap(({ picture }) => picture ?? [])));
		expect(references.size).toBeGreaterThan(170);
		for (const reference of references) {
			const svg = (await readPicture(reference, STIMULI)).toString();
			expect(svg, reference).not.toMatch(/<text|<script|<image|<foreignObject|href="(?!#)/);
		}
	});

	it('are each drawn in both widths, under the SHA-256 of the file', async () => {
		const files = pictureFiles();
		expect(new Set(files.map(({ width }) => width))).toEqual(new Set([384, 1024]));
		for (const { file } of new Map(files.map((file) => [file.file, file])).values()) {
			const name = createHash('sha256')
				.update(await media(file))
				.digest('hex')
				.slice(0, 32);
			expect(file).toBe(`${name}.webp`);
		}
	});

	it('fill the same share of their square', async () => {
		const small = pictureFiles().filter(({ width }) => width === 384);
		for (const { id, file } of new Map(small.map((picture) => [picture.file, picture])).values()) {
			const { data, info } = await sharp(await media(file))
				.ensureAlpha()
				.raw()
				.toBuffer({ resolveWithObject: true });
			expect([info.width, info.height]).toEqual([384, 384]);
			const ink = inkBox(data, 384, 384);
			const extent = Math.max(ink.width, ink.height) / 384;
			expect(extent, id).toBeGreaterThan(0.88);
			expect(extent, id).toBeLessThan(0.96);
		}
	});

	it('stand out from the ground', async () => {
		const small = pictureFiles().filter(({ width }) => width === 384);
		const pale: string[] = [];
		for (const { id, file } of new Map(small.map((picture) => [picture.file, picture])).values()) {
			const difference = await differenceFromGround(await media(file));
			if (difference < PALE) pale.push(`${id} ${difference.toFixed(1)}`);
		}
		expect(pale).toEqual([]);
	});

	it('would be found pale when they are', async () => {
		const [cloud] = await drawPicture(await readPicture('@iconify-json/noto:cloud', STIMULI));
		expect(await differenceFromGround(cloud?.webp ?? Buffer.alloc(0))).toBeLessThan(PALE);
	});
});

describe('the sounds', () => {
	const sounds = () =>
		items().flatMap(({ id, prompts }) =>
			prompts.flatMap((prompt) => (prompt.kind === 'sound' ? [{ id, ...prompt }] : []))
		);
	const loudness = (samples: Float32Array) =>
		10 * Math.log10(samples.reduce((sum, sample) => sum + sample * sample, 0) / samples.length);

	it('begin within 60 ms', async () => {
		expect(sounds().length).toBeGreaterThanOrEqual(60);
		for (const { id, file } of sounds()) {
			const { samples, sampleRate } = decodeWav(await media(file));
			const loudest = samples.reduce((most, sample) => Math.max(most, Math.abs(sample)), 0);
			const onset = samples.findIndex((sample) => Math.abs(sample) > 0.03 * loudest) / sampleRate;
			expect(onset, id).toBeGreaterThan(0);
			expect(onset, id).toBeLessThan(0.06);
		}
	});

	it('are 16 kHz, of one loudness within 1 dB, and never clipped', async () => {
		const levels: number[] = [];
		for (const { id, file, duration } of sounds()) {
			const { samples, sampleRate } = decodeWav(await media(file));
			expect(sampleRate).toBe(16000);
			expect(duration, id).toBeCloseTo(samples.length / sampleRate, 2);
			expect(samples.filter((sample) => Math.abs(sample) >= 0.999).length, id).toBeLessThan(2);
			levels.push(loudness(samples));
		}
		expect(Math.max(...levels) - Math.min(...levels)).toBeLessThan(1);
	});

	it('last as long as words and sentences do', () => {
		const durations = (kind: RegExp) =>
			sounds()
				.filter(({ id }) => kind.test(id) === true)
				.map(({ duration }) => duration);
		const sentences = durations(/sentence/);
		const words = durations(/^rep-(?!sentence)/);
		expect([Math.min(...words) > 0.2, Math.max(...words) < 1.5]).toEqual([true, true]);
		expect([Math.min(...sentences) > 1, Math.max(...sentences) < 5]).toEqual([true, true]);
	});
});
