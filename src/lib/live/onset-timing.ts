/** When something came on the screen, by `performance.now()`, and how that is known. */
export interface Onset {
	moment: number;
	source: 'presentation-time' | 'paint-time' | 'animation-frame';
}

/** Element Timing with the mix-in of Paint Timing (W3C drafts); Chromium has the two times since 145. */
interface ElementEntry extends PerformanceEntry {
	identifier: string;
	renderTime: number;
	paintTime?: number;
	presentationTime?: number;
}

/** The browser tells of an element soon after it was painted; after this it will not. */
const ENTRY_WAIT = 250;

/** Learns from the browser when an element that carries an `elementtiming` name was presented. */
export class OnsetTiming {
	#waiting = new Map<string, (entry: ElementEntry) => void>();
	#observer: PerformanceObserver | null = null;

	constructor() {
		if (!PerformanceObserver.supportedEntryTypes.includes('element')) return;
		this.#observer = new PerformanceObserver((list) => {
			for (const entry of list.getEntries() as ElementEntry[]) this.#waiting.get(entry.identifier)?.(entry);
		});
		this.#observer.observe({ type: 'element' });
	}

	/**
	 * Call in the animation frame that puts the element in.
	 *
	 * @param stamp of that frame: the answer when the browser gives no better one
	 */
	async measure(identifier: string, stamp: number): Promise<Onset> {
		const byFrame: Onset = { moment: stamp, source: 'animation-frame' };
		if (!this.#observer) return byFrame;
		const entry = await new Promise<ElementEntry | null>((found) => {
			this.#waiting.set(identifier, found);
			setTimeout(() => found(null), ENTRY_WAIT);
		});
		this.#waiting.delete(identifier);
		return (entry && fromEntry(entry)) ?? byFrame;
	}

	stop(): void {
		this.#observer?.disconnect();
	}
}

function fromEntry({ presentationTime, paintTime, renderTime }: ElementEntry): Onset | null {
	if (presentationTime) return { moment: presentationTime, source: 'presentation-time' };
	const painted = paintTime || renderTime;
	return painted ? { moment: painted, source: 'paint-time' } : null;
}
