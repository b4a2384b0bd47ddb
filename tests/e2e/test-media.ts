import { createHash } from 'node:crypto';
import { mkdtemp, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import sharp from 'sharp';
import { encodeWav } from '../../src/lib/server/media/wav';

export type PictureFiles = { file: string; width: number }[];

export interface TestMedia {
	folder: string;
	/** dark on its left half, light on its right one */
	halves: PictureFiles;
	/** dark all over */
	plain: PictureFiles;
	/** 440 Hz for half a second */
	tone: { file: string; duration: number };
	remove(): Promise<void>;
}

/** Pictures and a sound that tell by themselves how they are shown. */
export async function makeTestMedia(): Promise<TestMedia> {
	const folder = await mkdtemp(join(tmpdir(), 'wordkeep-media-'));
	const store = async (content: Buffer, extension: string) => {
		const file = `${createHash('sha256').update(content).digest('hex').slice(0, 32)}.${extension}`;
		await writeFile(join(folder, file), content);
		return file;
	};
	const picture = async (darkShare: number) => {
		const files: PictureFiles = [];
		for (const width of [512, 1024]) {
			const dark = { create: { width: width * darkShare, height: width, channels: 3 as const, background: '#101010' } };
			const image = sharp({ create: { width, height: width, channels: 3, background: '#f0f0f0' } });
			const drawn = await image
				.composite([{ input: await sharp(dark).png().toBuffer(), left: 0, top: 0 }])
				.webp({ lossless: true })
				.toBuffer();
			files.push({ file: await store(drawn, 'webp'), width });
		}
		return files;
	};
	const sampleRate = 48_000;
	const samples = Float32Array.from(
		{ length: sampleRate / 2 },
		(_, i) => 0.5 * Math.sin((2 * Math.PI * 440 * i) / sampleRate)
	);
	return {
		folder,
		halves: await picture(0.5),
		plain: await picture(1),
		tone: { file: await store(encodeWav({ samples, sampleRate }), 'wav'), duration: 0.5 },
		remove: () => rm(folder, { recursive: true })
	};
}
