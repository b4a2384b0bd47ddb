import type { Part } from '$lib/components/surgeon/fit-line';

const FAMILY = '"Atkinson Hyperlegible"';
const WEIGHTS = { mute: 400, ink: 700, frost: 700, ember: 700 };

/** Until these are there, widths would be those of another font. */
export async function loadFonts(): Promise<void> {
	await Promise.all([400, 700].map(async (weight) => await document.fonts.load(`${weight} 20px ${FAMILY}`)));
}

let context: CanvasRenderingContext2D | null | undefined;

/** Width in pixels of a part at a font size in pixels. */
export function partWidth({ text, tone }: Part, font: number): number {
	context ??= document.createElement('canvas').getContext('2d');
	if (!context) return Infinity;
	context.font = `${WEIGHTS[tone]} ${font}px ${FAMILY}`;
	return context.measureText(text).width;
}
