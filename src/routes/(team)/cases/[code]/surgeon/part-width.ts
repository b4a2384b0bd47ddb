import type { Part } from '$lib/components/surgeon/fit-line';

const FAMILY = '"Atkinson Hyperlegible"';
const WEIGHTS = { mute: 400, ink: 700, frost: 700, ember: 700 };
/** Words are measured once, at this size; their width grows with it. */
const SIZE = 100;

const known = new Map<string, number>();
let ruler: HTMLElement | undefined;

/** Until these are there, widths would be those of another font. */
export async function loadFonts(): Promise<void> {
	await Promise.all([400, 700].map(async (weight) => await document.fonts.load(`${weight} ${SIZE}px ${FAMILY}`)));
	known.clear();
}

/** Width in pixels of a part at a font size in pixels. Measured on the page: a canvas knows no tabular digits. */
export function partWidth({ text, tone }: Part, font: number): number {
	const key = `${WEIGHTS[tone]} ${text}`;
	let width = known.get(key);
	if (width === undefined) {
		ruler ??= makeRuler();
		ruler.style.fontWeight = String(WEIGHTS[tone]);
		ruler.textContent = text;
		width = ruler.getBoundingClientRect().width / SIZE;
		ruler.textContent = '';
		known.set(key, width);
	}
	return width * font;
}

function makeRuler(): HTMLElement {
	const span = document.createElement('span');
	span.setAttribute('aria-hidden', 'true');
	Object.assign(span.style, {
		position: 'fixed',
		visibility: 'hidden',
		whiteSpace: 'nowrap',
		fontFamily: FAMILY,
		fontSize: `${SIZE}px`
	});
	return document.body.appendChild(span);
}
