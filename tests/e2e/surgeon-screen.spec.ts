import AxeBuilder from '@axe-core/playwright';
import { expect, test, type Page } from '@playwright/test';
import { v7 } from 'uuid';
import type { EventData } from '../../src/lib/mapping/events';
import type { Score } from '../../src/lib/mapping/vocabulary';
import { PASSWORD, TestCase, TestServer } from './surgeon-case';

/** CSS pixels a millimetre of a screen of 55 inches with 1920 x 1080. */
const PX_PER_MM = 1.576;
const SCORES: Record<string, Score> = { i: 'intact', d: 'anomia', v: 'not-scorable', m: 'dysarthria' };

let server: TestServer;

test.beforeAll(async () => {
	server = await TestServer.create();
});
test.afterAll(async () => {
	await server.remove();
});

/** Trials at tags, one a letter. */
async function seed(
	trials: [tag: string, letters: string, given?: Partial<EventData['trial-presented']>][],
	tags: string[] = []
): Promise<TestCase> {
	const made = await TestCase.create(server);
	if (tags.length > 0) await made.note(...tags.map((tag): ['tag-placed', { tag: string }] => ['tag-placed', { tag }]));
	for (const [tag, letters, given] of trials) {
		for (const letter of letters) await made.trial({ tag, ...given }, SCORES[letter]);
	}
	return made;
}

async function open(page: Page, { code }: TestCase, screen = { pxPerMm: PX_PER_MM }): Promise<void> {
	const signedIn = await page.request.post(`${server.origin}/api/sign-in`, {
		data: { email: server.surgeon.email, password: PASSWORD }
	});
	expect(signedIn.ok()).toBe(true);
	await page.addInitScript(({ pxPerMm }) => {
		const sides = [window.screen.width, window.screen.height].sort((a, b) => a - b);
		localStorage.setItem(`wordkeep-screen-${sides.join('x')}`, JSON.stringify({ pixelsPerMm: pxPerMm }));
	}, screen);
	await page.goto(`${server.origin}/cases/${code}/surgeon`);
	await expect(page.getByRole('main')).toBeVisible();
}

const rings = (page: Page) => page.locator('svg[aria-label^="tag "]');
const ringNames = (page: Page) => rings(page).evaluateAll((all) => all.map((one) => one.getAttribute('aria-label')!));

const MANY: [string, string][] = [
	['1', 'iii'],
	['2', 'idi'],
	['3', 'ddi'],
	['4', 'd'],
	['5', 'dvid'],
	['6', 'mmi'],
	['10', 'ddii']
];

/** Worked out by hand from the rule: at least three valid trials, two thirds of them disturbed. */
const BY_HAND = [
	'tag 1, negative, 0 of 3 disturbed',
	'tag 2, negative, 1 of 3 disturbed',
	'tag 3, positive, 2 of 3 disturbed',
	'tag 4, open, 1 of 1 disturbed',
	'tag 5, positive, 2 of 3 disturbed, 1 not counted',
	'tag 6, positive (speech-motor), 2 of 3 disturbed',
	'tag 7, untested',
	'tag 10, negative, 2 of 4 disturbed'
];

test('shows every tag as the rule has it, the same as the map', async ({ page }) => {
	const made = await seed(MANY, ['7', '1']);
	await open(page, made);
	await expect(rings(page)).toHaveCount(BY_HAND.length);
	await expect.poll(() => ringNames(page)).toEqual(BY_HAND);

	const [language, motor] = await Promise.all([made.map(), made.map('speech-motor')]);
	for (const { tag, result, positive } of language.tags) {
		const rows = positive.length === 1 && positive[0] === 'speech-motor' ? motor.sites : language.sites;
		const row = rows.find((site) => site.tag === tag);
		const ring = rings(page).and(page.locator(`[aria-label^="tag ${tag},"]`));
		await expect(ring).toHaveAttribute('aria-label', new RegExp(`^tag ${tag}, ${result}`));
		if (row) await expect(ring).toHaveAttribute('aria-label', new RegExp(`${row.disturbed} of ${row.valid} disturbed`));
	}
	await expect(page.getByText('2 (1/3)')).toBeVisible();
	await expect(page.getByText('10 (2/4)')).toBeVisible();
	await expect(page.getByText('3 positive')).toBeVisible();
	await expect(page.getByText(/settled|will be negative/)).toHaveCount(0);
});

test('follows the case without a hand: a score, a correction, what changed away from positive', async ({ page }) => {
	const made = await seed([['3', 'dd']]);
	await open(page, made);
	await expect.poll(() => ringNames(page)).toEqual(['tag 3, open, 2 of 2 disturbed']);
	const { trial, entries } = await made.trial({ tag: '3' }, 'anomia');
	await expect.poll(() => ringNames(page)).toEqual(['tag 3, positive, 3 of 3 disturbed']);
	await made.note(
		['trial-scored', { trial, score: 'intact', corrects: [entries[1]!] }],
		...['a', 'b'].flatMap(
			(): [['trial-presented', EventData['trial-presented']], ['trial-scored', EventData['trial-scored']]] => {
				const next = v7();
				return [
					[
						'trial-presented',
						{
							trial: next,
							item: 'dog',
							task: 'object-naming',
							language: 'en',
							tag: '3',
							stimulated: true,
							milliamps: 3
						}
					],
					['trial-scored', { trial: next, score: 'intact', corrects: [] }]
				];
			}
		)
	);
	await expect.poll(() => ringNames(page)).toEqual(['tag 3, negative, 2 of 5 disturbed']);
	const news = page.locator('[aria-live="polite"]');
	await expect(news).toContainText('Tag 3: was positive, now negative');
	await expect(news).toContainText(/\d\d:\d\d:\d\d/);
	await page.reload();
	await expect(news).toContainText('Tag 3: was positive, now negative');
});

test('says that a trial waits for its score, and that one is contested', async ({ page }) => {
	const made = await seed([['3', 'i?']]);
	await open(page, made);
	await expect(page.getByText(/^not scored/)).toBeVisible();
	await expect.poll(() => ringNames(page)).toEqual(['tag 3, open, 0 of 1 disturbed']);
	const { trial } = await made.trial({ tag: '4' }, 'anomia');
	await made.note(['trial-scored', { trial, score: 'intact', corrects: [] }]);
	await expect(page.getByText('contested', { exact: true })).toBeVisible();
	await expect(page.getByText('Not scored: Tag 3')).toBeVisible();
});

for (const [width, height, pxPerMm, tags] of [
	[1920, 1080, PX_PER_MM, 30],
	[1280, 800, 1.45, 30],
	[1920, 1080, 96 / 25.4, 12],
	[1180, 820, 96 / 25.4, 4]
] as const) {
	test(`text is at least 22 minutes of arc high at 3 m: ${tags} tags, ${width} x ${height}`, async ({ page }) => {
		await page.setViewportSize({ width, height });
		const numbers = Array.from({ length: tags }, (_, index) => String(index + 1));
		const made = await seed(
			[
				['1', 'idi'],
				['2', 'ddd'],
				['2', 'id', { language: 'de' }]
			],
			numbers
		);
		await open(page, made, { pxPerMm });
		await expect(rings(page)).toHaveCount(tags);
		await page.evaluate(async () => await document.fonts.ready);

		const found = await page.evaluate(() => {
			const inks: { text: string; font: number; scale: number }[] = [];
			const walk = document.createTreeWalker(document.querySelector('main')!, NodeFilter.SHOW_TEXT);
			while (walk.nextNode()) {
				const parent = walk.currentNode.parentElement!;
				const text = walk.currentNode.textContent!.trim();
				if (text === '' || parent.closest('fieldset, .sr-only')) continue;
				const svg = parent.closest('svg');
				const scale = svg ? svg.getBoundingClientRect().width / svg.viewBox.baseVal.width : 1;
				inks.push({ text, font: parseFloat(getComputedStyle(parent).fontSize), scale });
			}
			return inks;
		});
		expect(found.length).toBeGreaterThan(tags);
		for (const { text, font, scale } of found) {
			// Capitals of Atkinson Hyperlegible are 668 of 1000 units high (OS/2 sCapHeight).
			const millimetres = (font * scale * 0.668) / pxPerMm;
			const minutes = (2 * Math.atan(millimetres / 2 / 3000) * 180 * 60) / Math.PI;
			expect(minutes, text).toBeGreaterThanOrEqual(21.99);
		}
		await expectNothingOutside(page);
	});
}

/** Nothing that stands on the screen reaches over its edge or over something else. */
async function expectNothingOutside(page: Page): Promise<void> {
	const boxes = await page
		.locator('main p:visible, main li')
		.evaluateAll((all) =>
			all
				.filter((one) => !one.closest('li') || one.tagName === 'LI')
				.map(
					(one) =>
						({ name: one.textContent ?? '', ...one.getBoundingClientRect().toJSON() }) as DOMRect & { name: string }
				)
		);
	const { width, height } = page.viewportSize()!;
	expect(boxes.length).toBeGreaterThan(1);
	for (const [index, a] of boxes.entries()) {
		expect(a.right, a.name).toBeLessThanOrEqual(width);
		expect(a.bottom, a.name).toBeLessThanOrEqual(height);
		for (const b of boxes.slice(index + 1)) {
			const apart = a.right <= b.left + 1 || b.right <= a.left + 1 || a.bottom <= b.top + 1 || b.bottom <= a.top + 1;
			expect(apart, `${a.name} and ${b.name}`).toBe(true);
		}
	}
}

for (const [width, height, tags] of [
	[1280, 800, 30],
	[1180, 820, 14]
] as const) {
	test(`says so when ${tags} numbers are too many for ${width} x ${height}`, async ({ page }) => {
		await page.setViewportSize({ width, height });
		const made = await seed(
			[['1', 'i?']],
			Array.from({ length: tags }, (_, index) => String(index + 1))
		);
		await made.trial({ tag: '12' }, 'negative-motor');
		await open(page, made, { pxPerMm: 96 / 25.4 });
		await expect(page.getByText(/read from [12]\.\d m$/)).toBeVisible();
		await expect(page.locator('main p').first()).toHaveText(/Tag 12\s*negative\s*motor\s*response/);
		await expectNothingOutside(page);
	});
}

test('says within 4 s that it is not up to date when the examiner falls silent, and dims', async ({ page }) => {
	const made = await seed([['1', 'idi']]);
	const run = v7();
	await made.note(['run-opened', { run, purpose: 'mapping', lead: made.device }]);
	let speaking = true;
	const talk = (async () => {
		while (speaking) {
			await made.presence({ waiting: 0, oldest: 0, leads: run });
			await new Promise((wait) => setTimeout(wait, 500));
		}
	})();
	await open(page, made);
	await expect(rings(page)).toHaveCount(1);
	await page.waitForTimeout(4500);
	await expect(page.getByText(/Not up to date/)).toHaveCount(0);

	speaking = false;
	await talk;
	await expect(page.getByText(/Not up to date since \d\d:\d\d:\d\d/)).toBeVisible({ timeout: 4000 });
	await expect(page.getByText('examiner not heard')).toBeVisible();
	await expect(page.locator('.results')).toHaveCSS('opacity', '0.6');

	await made.note(['run-closed', { run }]);
	await expect(page.getByText(/Not up to date/)).toHaveCount(0);
	await expect(page.locator('.results')).toHaveCSS('opacity', '1');

	await made.presence({ waiting: 2, oldest: 1500, leads: null });
	await expect(page.getByText('entries wait to be sent')).toBeVisible();
});

test('says within 4 s that it is not up to date when the server is gone, and comes back', async ({ page }) => {
	const made = await seed([['1', 'idi']]);
	await open(page, made);
	await expect(rings(page)).toHaveCount(1);
	await page.waitForTimeout(1500);
	await server.kill();
	await expect(page.getByText(/Not up to date since \d\d:\d\d:\d\d/)).toBeVisible({ timeout: 4000 });
	await expect(page.getByText('server not heard')).toBeVisible();
	await expect.poll(() => ringNames(page)).toEqual(['tag 1, negative, 1 of 3 disturbed']);
	await server.start();
	await expect(page.getByText(/Not up to date/)).toHaveCount(0, { timeout: 10_000 });
	await made.trial({ tag: '1' }, 'intact');
	await expect.poll(() => ringNames(page)).toEqual(['tag 1, negative, 1 of 4 disturbed']);
});

test('hides its results when the case log holds what it does not know', async ({ page }) => {
	const made = await seed([['1', 'ddd']]);
	server.addForeignEntry(made.code, 'resection-drawn');
	await open(page, made);
	await expect(page.getByText('This screen is older than the case log.')).toBeVisible();
	await expect(rings(page)).toHaveCount(0);
	await expect(page.getByText(/positive/)).toHaveCount(0);
});

test('tells the results apart in greyscale, at the smallest size a number may have', async ({ page }) => {
	const made = await seed(
		[
			['2', 'i'],
			['3', 'd'],
			['4', 'iii'],
			['5', 'idi'],
			['6', 'ddd'],
			['7', 'mmm'],
			['8', 'iivi']
		],
		['1']
	);
	await made.trial({ tag: '9' }, 'anomia');
	for (let i = 0; i < 2; i++) await made.trial({ tag: '9' }, 'anomia');
	for (let i = 0; i < 3; i++) await made.trial({ tag: '9', task: 'counting' }, 'dysarthria');
	await open(page, made);
	await expect(rings(page)).toHaveCount(9);
	// Every ring gets the same number, so that only its form differs.
	await rings(page).evaluateAll((all) => all.forEach((ring) => (ring.querySelector('text')!.textContent = '8')));
	await page.addStyleTag({ content: '.under-test { background: none !important; outline: none !important; }' });
	const devtools = await page.context().newCDPSession(page);
	await devtools.send('Emulation.setEmulatedVisionDeficiency', { type: 'achromatopsia' });

	const names = await ringNames(page);
	const shots: string[] = [];
	for (const ring of await rings(page).all()) shots.push((await ring.screenshot()).toString('base64'));
	const grey = await page.evaluate(async (pictures) => {
		const found: number[][] = [];
		for (const picture of pictures) {
			const bytes = Uint8Array.from(atob(picture), (sign) => sign.charCodeAt(0));
			const bitmap = await createImageBitmap(new Blob([bytes]));
			const canvas = new OffscreenCanvas(100, 100);
			const context = canvas.getContext('2d')!;
			context.drawImage(bitmap, 0, 0, 100, 100);
			const { data } = context.getImageData(0, 0, 100, 100);
			found.push(Array.from({ length: 10_000 }, (_, pixel) => data[pixel * 4]!));
			for (let pixel = 0; pixel < 10_000; pixel++) {
				if (Math.abs(data[pixel * 4]! - data[pixel * 4 + 2]!) > 8) throw new Error('the picture is not grey');
			}
		}
		return found;
	}, shots);

	for (const [index, a] of grey.entries()) {
		for (const [other, b] of grey.entries()) {
			if (other <= index) continue;
			const different = a.filter((value, pixel) => Math.abs(value - b[pixel]!) > 40).length;
			// 1.5 % of the square: an eighth of what a disturbed trial of three covers.
			expect(different, `${names[index]} and ${names[other]}`).toBeGreaterThan(150);
		}
	}
});

test('has no barrier that axe finds, in order and out of date', async ({ page }) => {
	const made = await seed([
		['1', 'idi'],
		['2', 'ddd'],
		['2', 'id', { language: 'de' }]
	]);
	await open(page, made);
	await expect(rings(page)).toHaveCount(2);
	const check = async () =>
		(await new AxeBuilder({ page }).withTags(['wcag2a', 'wcag2aa', 'wcag21aa', 'wcag22aa']).analyze()).violations;
	expect(await check()).toEqual([]);
	await made.presence({ waiting: 1, oldest: 5000, leads: null });
	await expect(page.getByText(/Not up to date/)).toBeVisible();
	expect(await check()).toEqual([]);
});
