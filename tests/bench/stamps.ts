import type { BrowserContext, Page } from '@playwright/test';

/** What a page saw since it was last asked; times in milliseconds since the epoch, by its monotonic clock. */
export interface Stamps {
	/** key presses, by the browser's own stamp of the event */
	keys: number[];
	/** messages of another window or of the server, as their first listener got them */
	received: { at: number; data: unknown }[];
	/** elements that carry an `elementtiming` name, when they were presented */
	painted: { at: number; name: string }[];
	/** changes of an element's accessible name */
	renamed: number[];
}

interface Stamping {
	stamps: Stamps;
	/** calls the bench; set up by `stampPages` */
	tellBench(what: string): Promise<void>;
}

/** Makes every page of a context keep stamps. It is the same for Wordkeep's pages and for the bare ones. */
export async function stampPages(context: BrowserContext): Promise<void> {
	await context.exposeBinding('tellBench', ({ page }, what: string) => waiting.get(page)?.(what));
	// The compiler that runs the bench keeps the names of functions by one of its own, which no page has.
	await context.addInitScript('globalThis.__name ??= (named) => named;');
	await context.addInitScript(stamp);
}

/** Runs in the page, before its own scripts. */
function stamp(): void {
	const page = globalThis as unknown as Stamping & typeof globalThis;
	const since = (moment: number) => performance.timeOrigin + moment;
	const now = () => since(performance.now());
	page.stamps = { keys: [], received: [], painted: [], renamed: [] };
	addEventListener('keydown', ({ timeStamp }) => page.stamps.keys.push(since(timeStamp)), { capture: true });

	const receive = (event: Event) => {
		page.stamps.received.push({ at: now(), data: (event as MessageEvent<unknown>).data });
	};
	page.BroadcastChannel = class extends BroadcastChannel {
		constructor(name: string) {
			super(name);
			this.addEventListener('message', receive);
		}
	};
	page.EventSource = class extends EventSource {
		constructor(url: string | URL) {
			super(url);
			for (const name of ['message', 'display']) this.addEventListener(name, receive);
		}
	};
	new PerformanceObserver((list) => {
		for (const entry of list.getEntries() as (PerformanceEntry & { identifier: string; presentationTime: number })[]) {
			page.stamps.painted.push({ at: since(entry.presentationTime), name: entry.identifier });
			void page.tellBench('painted');
		}
	}).observe({ type: 'element' });
	new MutationObserver(() => {
		page.stamps.renamed.push(now());
		void page.tellBench('renamed');
	}).observe(document, { subtree: true, attributes: true, attributeFilter: ['aria-label'] });
}

const waiting = new Map<Page, (what: string) => void>();

/** Waits until a page tells of something; call before what brings it about. Rejects after `limit` milliseconds. */
export function told(page: Page, what: 'painted' | 'renamed', limit = 5000): Promise<void> {
	return new Promise((done, failed) => {
		const late = setTimeout(() => end(() => failed(new Error(`nothing was ${what} within ${limit} ms`))), limit);
		const end = (how: () => void) => {
			clearTimeout(late);
			waiting.delete(page);
			how();
		};
		waiting.set(page, (heard) => heard === what && end(done));
	});
}

/** What the page saw since it was asked before. */
export async function takeStamps(page: Page): Promise<Stamps> {
	return await page.evaluate(() => {
		const { stamps } = globalThis as unknown as Stamping;
		const taken = structuredClone(stamps);
		for (const list of Object.values(stamps) as unknown[][]) list.length = 0;
		return taken;
	});
}
