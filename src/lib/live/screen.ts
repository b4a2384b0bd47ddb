/** What this screen is: its scale, by a card held against it, and how far away its reader stands. */
export interface Screen {
	/** CSS pixels a millimetre */
	pxPerMm: number;
	/** from the reader's eyes, in millimetres; null where nobody said */
	distanceMm: number | null;
	/** the scale was measured on this screen */
	calibrated: boolean;
}

const KEY = 'wordkeep-screen';
/** CSS Values and Units: 96 px are one inch of 25.4 mm where nothing else is known. */
const CSS_PX_PER_MM = 96 / 25.4;

/** What is known of this screen; without a measurement, the scale that CSS assumes. */
export function readScreen(): Screen {
	const kept = readKept();
	return {
		pxPerMm: kept.pxPerMm ?? CSS_PX_PER_MM,
		distanceMm: kept.distanceMm ?? null,
		calibrated: kept.pxPerMm !== undefined
	};
}

/** CSS pixels a millimetre on this screen. */
export function pxPerMm(): number {
	return readScreen().pxPerMm;
}

/** Keeps what was found out about this screen; what is not given stays as it was. */
export function keepScreen(change: { pxPerMm?: number; distanceMm?: number }): void {
	localStorage.setItem(KEY, JSON.stringify({ ...readKept(), ...change }));
}

function readKept(): { pxPerMm?: number; distanceMm?: number } {
	try {
		const kept = JSON.parse(localStorage.getItem(KEY) ?? '{}') as Record<string, unknown>;
		return { ...positive(kept, 'pxPerMm'), ...positive(kept, 'distanceMm') };
	} catch {
		// What cannot be read is as good as nothing kept.
		return {};
	}
}

function positive(kept: Record<string, unknown>, name: string): Record<string, number> {
	const value = kept[name];
	return typeof value === 'number' && Number.isFinite(value) && value > 0 ? { [name]: value } : {};
}
