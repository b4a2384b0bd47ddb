import type { Page } from '@playwright/test';

/** Where the focus rests on its way through a page. */
export interface FocusStop {
	/** the beginning of its markup */
	name: string;
	/** after the stop before it in the document */
	isOrdered: boolean;
	/** an outline of at least 2 CSS pixels is drawn round it */
	isOutlined: boolean;
	/** something else lies over all of it, or it is out of the window */
	isCovered: boolean;
}

const MOST = 200;

/** Goes through the page with Tab from its beginning to its end. */
export async function focusStops(page: Page): Promise<FocusStop[]> {
	const stops: FocusStop[] = [];
	await page.evaluate(() => {
		(document.activeElement as HTMLElement | null)?.blur();
		document.getSelection()?.removeAllRanges();
		Object.assign(window, { lastStop: null });
	});
	while (stops.length < MOST) {
		await page.keyboard.press('Tab');
		const stop = await page.evaluate((): FocusStop | 'within' | null => {
			const element = document.activeElement as HTMLElement | null;
			const seen = window as unknown as { lastStop: HTMLElement | null; firstStop?: HTMLElement };
			if (!element || element === document.body || (element === seen.firstStop && element !== seen.lastStop))
				return null;
			const before = seen.lastStop;
			// Day, month and year of a date are one control of the browser's own.
			if (element === before) return 'within';
			seen.firstStop ??= element;
			seen.lastStop = element;
			const { outlineStyle, outlineWidth } = getComputedStyle(element);
			const { left, top, right, bottom } = element.getBoundingClientRect();
			const places = [
				[(left + right) / 2, (top + bottom) / 2],
				[left + 3, top + 3],
				[right - 3, top + 3],
				[left + 3, bottom - 3],
				[right - 3, bottom - 3]
			] as const;
			return {
				name: element.outerHTML.slice(0, 160),
				isOrdered: !before || (before.compareDocumentPosition(element) & Node.DOCUMENT_POSITION_FOLLOWING) !== 0,
				isOutlined: outlineStyle !== 'none' && parseFloat(outlineWidth) >= 2,
				isCovered: !places.some(([x, y]) => {
					const hit = document.elementFromPoint(x, y);
					return hit !== null && (element.contains(hit) || hit.contains(element));
				})
			};
		});
		if (!stop) break;
		if (stop !== 'within') stops.push(stop);
	}
	return stops;
}

/** The controls of a page that somebody sees and may use; of a group of radio buttons the one that takes the focus. */
export async function reachable(page: Page): Promise<string[]> {
	return await page.evaluate(() => {
		const groups = new Set<string>();
		return [...document.querySelectorAll<HTMLElement>('a[href], button, input, select, textarea, [tabindex]')]
			.filter((element) => {
				if (element.matches(':disabled, input[type=hidden], [tabindex="-1"]')) return false;
				if (element.getClientRects().length === 0 || getComputedStyle(element).visibility === 'hidden') return false;
				if (!(element instanceof HTMLInputElement) || element.type !== 'radio') return true;
				const chosen = document.querySelector(`input[name="${CSS.escape(element.name)}"]:checked`);
				if (groups.has(element.name) || (chosen && chosen !== element)) return false;
				groups.add(element.name);
				return true;
			})
			.map((element) => element.outerHTML.slice(0, 160));
	});
}
