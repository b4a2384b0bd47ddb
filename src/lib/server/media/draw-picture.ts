import sharp from 'sharp';

/** Widths in pixels: a telephone's share of the screen, and 10 degrees on a dense tablet. */
export const PICTURE_WIDTHS = [384, 1024] as const;

/** Share of the frame that the longer side of the ink takes, so that all pictures look equally large. */
const INK_SHARE = 0.92;
/** Everything is drawn larger than the widest file first, so that the crop never has to be enlarged. */
const DRAWN = 1280;
/** Alpha of 255 below which a pixel is no ink: a faint shadow must not move the picture. */
const FAINT = 16;

export interface InkBox {
	left: number;
	top: number;
	width: number;
	height: number;
}

/**
 * The smallest box around all ink of an RGBA picture.
 * @throws Error when there is none
 */
export function inkBox(rgba: Uint8Array, width: number, height: number): InkBox {
	let [left, top, right, bottom] = [width, height, -1, -1];
	for (let y = 0; y < height; y++) {
		for (let x = 0; x < width; x++) {
			if ((rgba[(y * width + x) * 4 + 3] ?? 0) < FAINT) continue;
			if (x < left) left = x;
			if (x > right) right = x;
			if (y < top) top = y;
			bottom = y;
		}
	}
	if (right < 0) throw new Error('the picture is empty');
	return { left, top, width: right - left + 1, height: bottom - top + 1 };
}

/**
 * Draws a picture (SVG, PNG, JPEG or WebP) on a transparent square, cropped to its ink and centred.
 * @returns one WebP file for each of `PICTURE_WIDTHS`, smallest first
 */
export async function drawPicture(source: Buffer): Promise<{ width: number; webp: Buffer }[]> {
	const { width = 1, height = 1, density = 72 } = await sharp(source).metadata();
	const wanted = Math.min(2400, (density * DRAWN) / Math.max(width, height));
	const drawn = await sharp(source, { density: Math.max(72, wanted) })
		.resize(DRAWN, DRAWN, { fit: 'inside' })
		.ensureAlpha()
		.raw()
		.toBuffer({ resolveWithObject: true });
	const raw = { width: drawn.info.width, height: drawn.info.height, channels: 4 } as const;
	const ink = inkBox(drawn.data, raw.width, raw.height);
	return Promise.all(
		PICTURE_WIDTHS.map(async (frame) => {
			const inner = Math.round(frame * INK_SHARE);
			const margin = Math.floor((frame - inner) / 2);
			const webp = await sharp(drawn.data, { raw })
				.extract(ink)
				.resize(inner, inner, { fit: 'contain', background: 'transparent' })
				.extend({
					top: margin,
					left: margin,
					bottom: frame - inner - margin,
					right: frame - inner - margin,
					background: 'transparent'
				})
				.webp({ quality: 90, alphaQuality: 100, effort: 2 })
				.toBuffer();
			return { width: frame, webp };
		})
	);
}
