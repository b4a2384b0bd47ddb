import type { DisplayPrompt, Layout } from '$lib/stimuli/display';
import { itemSide, letterSize, offsetOf } from '$lib/stimuli/item-size';
import { readScreen } from './screen';

/** Side in CSS pixels of an item on this screen. */
export function sideOnScreen(layout: Layout): number {
	return itemSide(layout, readScreen().pxPerMm, { width: innerWidth, height: innerHeight });
}

/**
 * Style that lays a square of `side` as the layout says: turned first, then mirrored as the screen is seen in a mirror,
 * then moved.
 */
export function layoutStyle(layout: Layout, side: number): string {
	const x = offsetOf(layout.x, innerWidth, side);
	const y = offsetOf(layout.y, innerHeight, side);
	return [
		'position:absolute;left:50%;top:50%',
		`width:${side}px;height:${side}px`,
		`transform:translate(calc(${x}px - 50%), calc(${y}px - 50%)) scaleX(${layout.mirrored ? -1 : 1}) rotate(${layout.turn * 90}deg)`
	].join(';');
}

/** Letters beside a picture leave it the room: at most this part of the side. */
const LETTERS_BESIDE = 10;
const ITEM_STYLE = 'display:grid;place-items:center;place-content:center;grid-template-columns:minmax(0,1fr);gap:4%';
const PICTURE_STYLE = 'width:100%;height:100%;min-height:0;object-fit:contain';
const TEXT_STYLE = 'margin:0;text-align:center;text-wrap:balance;overflow-wrap:anywhere;line-height:1.25;color:#14191a';

/** The screen that a patient looks at: one item, or the plain ground. */
export class Stage {
	#host: HTMLElement;
	#layout: Layout;
	#item: { element: HTMLElement; visible: HTMLElement[] } | null = null;

	constructor(host: HTMLElement, layout: Layout) {
		this.#host = host;
		this.#layout = layout;
	}

	set layout(layout: Layout) {
		this.#layout = layout;
		this.fit();
	}

	/** Call when the window has changed its size, too. */
	fit(): void {
		if (!this.#item) return;
		const { element, visible } = this.#item;
		const side = sideOnScreen(this.#layout);
		// A picture takes the room that text leaves.
		const rows = visible.map((one) => (one instanceof HTMLImageElement ? 'minmax(0,1fr)' : 'auto')).join(' ');
		element.style.cssText = `${layoutStyle(this.#layout, side)};${ITEM_STYLE};grid-template-rows:${rows}`;
		const beside = visible.length > 1 ? side / LETTERS_BESIDE : Infinity;
		for (const one of visible) {
			if (!(one instanceof HTMLParagraphElement)) continue;
			one.style.fontSize = `${Math.min(beside, letterSize(one.textContent, side))}px`;
		}
	}

	/** Takes off what is there and puts an item on. */
	put(visible: HTMLElement[]): void {
		const element = document.createElement('div');
		element.append(...visible);
		this.#item = { element, visible };
		this.fit();
		this.#host.replaceChildren(element);
	}

	clear(): void {
		this.#item = null;
		this.#host.replaceChildren();
	}
}

/**
 * Makes the elements of an item, pictures decoded, without showing them. The first of them carries `identifier`, by
 * which the browser tells when it was on the screen.
 */
export async function makeElements(
	prompts: readonly DisplayPrompt[],
	identifier: string,
	pictureAddress: (files: { file: string; width: number }[]) => Promise<string>
): Promise<HTMLElement[]> {
	const made = prompts.map(async (prompt) => {
		if (prompt.kind === 'text') return makeText(prompt.text);
		return prompt.kind === 'picture' ? await makePicture(await pictureAddress(prompt.files)) : null;
	});
	const elements = (await Promise.all(made)).filter((one) => one !== null);
	elements[0]?.setAttribute('elementtiming', identifier);
	return elements;
}

async function makePicture(address: string): Promise<HTMLImageElement> {
	const image = new Image();
	image.alt = '';
	image.draggable = false;
	image.style.cssText = PICTURE_STYLE;
	image.src = address;
	await image.decode();
	return image;
}

function makeText(text: string): HTMLParagraphElement {
	const paragraph = document.createElement('p');
	paragraph.style.cssText = TEXT_STYLE;
	paragraph.textContent = text;
	return paragraph;
}
