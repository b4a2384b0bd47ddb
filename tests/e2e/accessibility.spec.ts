/**
 * Every page, in its lighting, against the rules of WCAG 2.2 level AA that axe-core can decide (https://www.w3.org/TR/WCAG22/;
 * tags in axe-core's doc/API.md), and against some that it cannot: focus visible and not obscured (2.4.7, 2.4.11), keyboard
 * (2.1.1), focus order (2.4.3), reflow (1.4.10), page titled (2.4.2).
 */
import AxeBuilder from '@axe-core/playwright';
import { expect, test, type Page } from '@playwright/test';
import { readdirSync } from 'node:fs';
import { DemoClinic, VISITS, type PageState } from './page-visits';
import { focusStops, reachable, type FocusStop } from './focus-stops';

const WCAG = ['wcag2a', 'wcag2aa', 'wcag21aa', 'wcag22aa'];
/** A tablet and a phone held upright, and a wide window. */
const SIZES = [
	{ width: 820, height: 1180 },
	{ width: 390, height: 844 },
	{ width: 1280, height: 800 }
];
const COLOUR_SCHEMES = { daylight: 'light', theatre: 'dark' };

let clinic: DemoClinic;

test.beforeAll(async ({ browser }) => {
	clinic = await DemoClinic.open(browser);
});

test.afterAll(async () => {
	await clinic.close();
});

/** The routes of all pages, read from the file tree. */
function pagesInTree(): string[] {
	return readdirSync('src/routes', { recursive: true, encoding: 'utf8' })
		.filter((path) => /(^|\/)\+page(@[^/]*)?\.svelte$/.test(path))
		.map((path) => `/${path.slice(0, path.lastIndexOf('/'))}`)
		.sort();
}

/** Opens a page in a state, with what its console says. */
async function open(state: PageState): Promise<{ page: Page; faults: string[] }> {
	const page = await clinic.page(state.role);
	const faults: string[] = [];
	page.on('pageerror', (error) => faults.push(String(error)));
	page.on('console', (message) => {
		const isAnswer = message.text().startsWith('Failed to load resource');
		if (message.type() === 'error' && !(state.refused && isAnswer)) faults.push(message.text());
	});
	await state.show(page, clinic);
	await expect(page.locator('main, [data-testid=stage]').first()).toBeAttached();
	await expect(page.getByText(/^Reading the .* \.\.\.$/)).toHaveCount(0);
	return { page, faults };
}

/** What reaches over the right edge of the window outside a frame that scrolls by itself. */
async function cut(page: Page): Promise<string[]> {
	return await page.evaluate(() => {
		const found = document.documentElement.scrollWidth > innerWidth ? ['the page scrolls sideways'] : [];
		for (const element of document.body.querySelectorAll<HTMLElement>('*')) {
			const { right, left, width, height } = element.getBoundingClientRect();
			if (width < 2 || height < 2 || (right <= innerWidth + 1 && left >= -1)) continue;
			let around: HTMLElement | null = element;
			while (around && !/auto|scroll|hidden|clip/.test(getComputedStyle(around).overflowX))
				around = around.parentElement;
			if (!around) found.push(element.outerHTML.slice(0, 120));
		}
		return found;
	});
}

test('every page in the file tree is visited', () => {
	expect(pagesInTree().length).toBeGreaterThan(10);
	expect(Object.keys(VISITS).sort()).toEqual(pagesInTree());
});

for (const [route, { lighting, states }] of Object.entries(VISITS)) {
	test(`${route} in ${lighting}`, async () => {
		test.setTimeout(120_000);
		for (const state of states) {
			await test.step(state.name, async () => {
				const { page, faults } = await open(state);
				const scheme = await page.evaluate(
					() => getComputedStyle(document.querySelector('main') ?? document.body).colorScheme
				);
				expect.soft(scheme, state.name).toBe(COLOUR_SCHEMES[lighting]);
				for (const size of SIZES) {
					await page.setViewportSize(size);
					expect.soft(await cut(page), `${state.name}, ${size.width} wide`).toEqual([]);
				}
				const { violations } = await new AxeBuilder({ page }).withTags(WCAG).analyze();
				expect
					.soft(
						violations.map(({ id, nodes }) => [id, nodes[0]?.html]),
						state.name
					)
					.toEqual([]);
				expect.soft(faults, state.name).toEqual([]);
				await page.close();
			});
		}
	});
}

test('every page has a title of its own and is used by the keyboard alone', async () => {
	test.setTimeout(120_000);
	const titles: string[] = [];
	for (const [route, { states }] of Object.entries(VISITS)) {
		await test.step(route, async () => {
			const { page } = await open(states[0]!);
			titles.push(await page.title());
			const stops = await focusStops(page);
			const names = (found: FocusStop[]) => found.map(({ name }) => name);
			expect.soft(names(stops).sort(), `${route}: reached`).toEqual((await reachable(page)).sort());
			expect.soft(names(stops.filter(({ isOrdered }) => !isOrdered)), `${route}: out of order`).toEqual([]);
			expect.soft(names(stops.filter(({ isOutlined }) => !isOutlined)), `${route}: focus not seen`).toEqual([]);
			expect.soft(names(stops.filter(({ isCovered }) => isCovered)), `${route}: focus covered`).toEqual([]);
			await page.close();
		});
	}
	expect(titles.filter((title) => !/\S/.test(title))).toEqual([]);
	expect([...new Set(titles)].sort()).toEqual(titles.sort());
});
