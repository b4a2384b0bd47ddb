let context: CanvasRenderingContext2D | null | undefined;

/** Width in pixels of bold words at a font size in pixels, once the font is loaded. */
export function measureBold(text: string, size: number): number {
	context ??= document.createElement('canvas').getContext('2d');
	if (!context) return Infinity;
	context.font = `700 ${size}px "Atkinson Hyperlegible"`;
	return context.measureText(text).width;
}
