import { ASSUMED_PX_PER_MM } from '$lib/stimuli/item-size';

/** What is known of this screen: its scale, by a card laid on it, and how far away its reader is. */
export interface Screen {
	/** CSS pixels a millimetre; what browsers assume where nobody measured */
	pxPerMm: number;
	/** from the reader's eyes, in millimetres; null where nobody said */
	distanceMm: number | null;
	/** the scale was measured on this screen */
	calibrated: boolean;
}

interface Kept {
	/** the screen's own pixels a millimetre, so that a measure outlasts a change of zoom */
	pixelsPerMm?: number;
	distanceMm?: number;
}

/** Names a screen by its own pixels, however it is turned and zoomed: another screen needs a measure of its own. */
function storageKey(): string {
	const sides = [screen.width, screen.height].map((side) => Math.round(side * devicePixelRatio));
	return `wordkeep-screen-${sides.sort((a, b) => a - b).join('x')}`;
}

export function readScreen(): Screen {
	const { pixelsPerMm, distanceMm } = readKept();
	return {
		pxPerMm: pixelsPerMm === undefined ? ASSUMED_PX_PER_MM : pixelsPerMm / devicePixelRatio,
		distanceMm: distanceMm ?? null,
		calibrated: pixelsPerMm !== undefined
	};
}

/** Keeps what was found out about this screen; what is not given stays as it was. */
export function keepScreen({ pxPerMm, distanceMm }: { pxPerMm?: number; distanceMm?: number }): void {
	const kept: Kept = {
		...readKept(),
		...(pxPerMm === undefined ? {} : { pixelsPerMm: pxPerMm * devicePixelRatio }),
		...(distanceMm === undefined ? {} : { distanceMm })
	};
	localStorage.setItem(storageKey(), JSON.stringify(kept));
	applyScale();
}

/** Gives style sheets a millimetre of this screen, `--mm`, once it was measured. */
export function applyScale(): void {
	const { calibrated, pxPerMm } = readScreen();
	if (calibrated) document.documentElement.style.setProperty('--mm', `${pxPerMm}px`);
}

function readKept(): Kept {
	try {
		const kept = JSON.parse(localStorage.getItem(storageKey()) ?? '{}') as Record<string, unknown>;
		return { ...positive(kept, 'pixelsPerMm'), ...positive(kept, 'distanceMm') };
	} catch {
		// What cannot be read is as good as nothing kept.
		return {};
	}
}

function positive(kept: Record<string, unknown>, name: keyof Kept): Kept {
	const value = kept[name];
	return typeof value === 'number' && Number.isFinite(value) && value > 0 ? { [name]: value } : {};
}
