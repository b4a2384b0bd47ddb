import sharp from 'sharp';
import { describe, expect, it } from 'vitest';
import { drawPicture, inkBox, PICTURE_WIDTHS } from '../../../src/lib/server/media/draw-picture';

const svg = (body: string, box = '0 0 128 128') =>
	Buffer.from(`<svg xmlns="http://www.w3.org/2000/svg" width="128" height="128" viewBox="${box}">${body}</svg>`);

async function inkOf(webp: Buffer) {
	const { data, info } = await sharp(webp).ensureAlpha().raw().toBuffer({ resolveWithObject: true });
	return {
		...inkBox(data, info.width, info.height),
		frame: info.width,
		height2: info.height,
		first: data.subarray(0, 4)
	};
}

describe('drawPicture', () => {
	it.each([
		['a small mark in a corner', '<rect x="4" y="8" width="20" height="10" fill="#c00"/>', 2],
		['a tall one', '<rect x="60" y="2" width="30" height="120" fill="#00c"/>', 0.25],
		['one that fills its box', '<circle cx="64" cy="64" r="64" fill="#080"/>', 1]
	])('brings %s to one extent, centred on a transparent square', async (_, body, ratio) => {
		for (const { width, webp } of await drawPicture(svg(body))) {
			const ink = await inkOf(webp);
			expect([ink.frame, ink.height2]).toEqual([width, width]);
			expect(Math.max(ink.width, ink.height) / width).toBeCloseTo(0.92, 1.7);
			expect(ink.width / ink.height).toBeCloseTo(ratio, 1);
			expect(Math.abs(ink.left - (width - ink.left - ink.width))).toBeLessThanOrEqual(4);
			expect(Math.abs(ink.top - (width - ink.top - ink.height))).toBeLessThanOrEqual(4);
			expect(ink.first[3]).toBe(0);
		}
	});

	it('draws every width, smallest first', async () => {
		const drawn = await drawPicture(svg('<circle cx="64" cy="64" r="20"/>'));
		expect(drawn.map(({ width }) => width)).toEqual([...PICTURE_WIDTHS]);
		expect(PICTURE_WIDTHS).toEqual([384, 1024]);
	});

	it('keeps the colour', async () => {
		const [small] = await drawPicture(svg('<rect x="10" y="10" width="90" height="90" fill="#3366cc"/>'));
		const { data, info } = await sharp(small?.webp).raw().toBuffer({ resolveWithObject: true });
		const middle = (192 * 384 + 192) * info.channels;
		const painted = [0x33, 0x66, 0xcc];
		painted.forEach((value, channel) => expect(Math.abs((data[middle + channel] ?? 0) - value)).toBeLessThanOrEqual(4));
	});

	it('takes a photograph whole', async () => {
		const photograph = await sharp({ create: { width: 600, height: 400, channels: 3, background: '#a52' } })
			.jpeg()
			.toBuffer();
		const [small] = await drawPicture(photograph);
		const ink = await inkOf(small?.webp ?? Buffer.alloc(0));
		expect(ink.width / ink.height).toBeCloseTo(1.5, 1);
	});

	it('refuses an empty picture', async () => {
		await expect(drawPicture(svg(''))).rejects.toThrow('the picture is empty');
	});
});
