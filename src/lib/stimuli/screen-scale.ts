import { ASSUMED_PX_PER_MM } from './item-size';

/** A card of the size ID-1, as bank and identity cards have it (ISO/IEC 7810), in millimetres. */
export const CARD = { width: 85.6, height: 53.98 };

/** Names a screen by its own pixels, however it is turned and zoomed: another screen needs a measure of its own. */
function storageKey(): string {
	const sides = [screen.width, screen.height].map((side) => Math.round(side * devicePixelRatio));
	return `wordkeep-scale-${sides.sort((a, b) => a - b).join('x')}`;
}

/** CSS pixels per millimetre on this screen, as it was measured with a card; null when it was not. */
export function measuredScale(): number | null {
	const stored = Number(localStorage.getItem(storageKey()));
	return stored > 0 ? stored / devicePixelRatio : null;
}

/** The measured scale, or what browsers assume. */
export function screenScale(): number {
	return measuredScale() ?? ASSUMED_PX_PER_MM;
}

/** Keeps a measure on this device, in the screen's own pixels, so that it outlasts a change of zoom. */
export function saveScale(pxPerMm: number): void {
	localStorage.setItem(storageKey(), String(pxPerMm * devicePixelRatio));
	applyScale();
}

/** Gives style sheets a millimetre of this screen: `--mm`. */
export function applyScale(): void {
	document.documentElement.style.setProperty('--mm', `${screenScale()}px`);
}
