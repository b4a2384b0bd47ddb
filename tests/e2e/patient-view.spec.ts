import AxeBuilder from '@axe-core/playwright';
import { chromium, expect, test, type BrowserContext, type Page } from '@playwright/test';
import sharp from 'sharp';
import { v7 } from 'uuid';
import type { CaseItem } from '../../src/lib/mapping/events';
import type { DisplayCommand } from '../../src/lib/stimuli/display';
import { firstAdministrator, newMember, startServer, type Member, type Server } from '../api/server';
import { PatientCase } from './patient-case';
import { makeTestMedia, type TestMedia } from './test-media';

/** Two frames at 60 Hz, in milliseconds: what a picture may come before its time by rounding to a frame. */
const FRAME = 2 * 17;

const GROUND = [0xd5, 0xd9, 0xde];
const DARK = [0x10, 0x10, 0x10];
const LIGHT = [0xf0, 0xf0, 0xf0];

let media: TestMedia;
let server: Server;
let examiner: Member;

async function start(options: Parameters<typeof startServer>[0] = {}): Promise<Server> {
	return await startServer({ ...options, env: { MEDIA_DIR: media.folder } });
}

test.beforeAll(async () => {
	media = await makeTestMedia();
	server = await start();
	examiner = await newMember(server, await firstAdministrator(server), 'examiner', ['examiner']);
});

test.afterAll(async () => {
	await server.stop();
	await media.remove();
});

const picture = (files = media.halves) => ({ kind: 'picture' as const, files });
const sound = () => ({ kind: 'sound' as const, ...media.tone });
const text = (words: string) => ({ kind: 'text' as const, text: words });

function pictures(): CaseItem[] {
	return [
		{ id: 'halves', answer: 'halves', accepted: [], prompts: [picture()] },
		{ id: 'plain', answer: 'plain', accepted: [], prompts: [picture(media.plain)] }
	];
}

const words = (): CaseItem[] => [{ id: 'tone', answer: 'tone', accepted: [], prompts: [sound()] }];

const stage = (page: Page) => page.getByTestId('stage');

/** The colour of the screen at a place, from the middle of a 1280 x 800 window. */
async function colourAt(page: Page, x: number, y: number): Promise<number[]> {
	const { data, info } = await sharp(await page.screenshot())
		.removeAlpha()
		.raw()
		.toBuffer({ resolveWithObject: true });
	const at = (Math.round(info.height / 2 + y) * info.width + Math.round(info.width / 2 + x)) * info.channels;
	return [...data.subarray(at, at + 3)];
}

/** Every pixel of the window, as distinct colours. */
async function colours(page: Page): Promise<number[][]> {
	const { data } = await sharp(await page.screenshot())
		.removeAlpha()
		.raw()
		.toBuffer({ resolveWithObject: true });
	const found = new Set<number>();
	for (let at = 0; at < data.length; at += 3) found.add((data[at]! << 16) | (data[at + 1]! << 8) | data[at + 2]!);
	return [...found].map((colour) => [colour >> 16, (colour >> 8) & 255, colour & 255]);
}

/** Writes down when anything is put on the stage or taken off, by the page's clock. */
async function watchStage(page: Page): Promise<() => Promise<{ at: number; items: number }[]>> {
	await stage(page).evaluate((element) => {
		const seen: { at: number; items: number }[] = [];
		new MutationObserver(() => seen.push({ at: performance.now(), items: element.childElementCount })).observe(
			element,
			{
				childList: true
			}
		);
		Object.assign(window, { seenOnStage: seen });
	});
	return () => page.evaluate(() => (window as unknown as { seenOnStage: { at: number; items: number }[] }).seenOnStage);
}

async function ready(page: Page): Promise<void> {
	await page.getByRole('button', { name: 'Ready' }).click();
	await expect(page.getByRole('heading')).toHaveCount(0);
}

async function violations(page: Page): Promise<string[]> {
	const { violations } = await new AxeBuilder({ page })
		.withTags(['wcag2a', 'wcag2aa', 'wcag21aa', 'wcag22aa'])
		.analyze();
	return violations.map(({ id, nodes }) => `${id}: ${nodes.map(({ html }) => html).join(' ')}`);
}

test.describe('pairing', () => {
	test('by a code that is typed, once the examiner has confirmed the number both see', async ({ page }) => {
		const found = await PatientCase.make(examiner.client, pictures());
		const { id, code } = await found.offer();
		await page.goto(`${server.url}/patient`);
		expect(await violations(page)).toEqual([]);
		await page.getByLabel('Code').fill(code.toLowerCase().replace('-', ' '));
		await page.getByRole('button', { name: 'Pair this screen' }).click();
		await expect(page.getByText(/The examiner sees \d\d too/)).toBeVisible();
		const waiting = await found.waiting();
		expect(waiting).toMatchObject({ id, state: 'claimed' });
		await expect(page.getByText(`The examiner sees ${waiting!.checkWord} too`)).toBeVisible();
		expect(await violations(page)).toEqual([]);
		await found.confirm(id);
		await expect(page.getByRole('heading', { name: 'Set up the screen' })).toBeVisible();
	});

	test('by a link, whose code does not stay in the address', async ({ page }) => {
		const found = await PatientCase.make(examiner.client, pictures());
		await found.pair(page);
		expect(page.url()).toBe(`${server.url}/patient`);
	});

	test('a code that was used, is wrong or too short says so and lets one try again', async ({ page, context }) => {
		const found = await PatientCase.make(examiner.client, pictures());
		const { code } = await found.offer();
		await page.goto(`${server.url}/patient#${code}`);
		await page.getByText(/The examiner sees/).waitFor();
		const other = await context.browser()!.newContext();
		const second = await other.newPage();
		await second.goto(`${server.url}/patient#${code}`);
		await expect(second.getByText('This code does not fit, was used, or is too old')).toBeVisible();
		await second.getByLabel('Code').fill('ABCD');
		await second.getByRole('button', { name: 'Pair this screen' }).click();
		await expect(second.getByText('A code has eight letters and digits.')).toBeVisible();
		await second.getByLabel('Code').fill((await found.offer()).code);
		await second.getByRole('button', { name: 'Pair this screen' }).click();
		await expect(second.getByText(/The examiner sees/)).toBeVisible();
		// The first screen's code was replaced by the new one.
		await expect(page.getByLabel('Code')).toBeVisible();
		await other.close();
	});

	test('ends when the examiner ends it: plain ground, then a new code', async ({ page }) => {
		const found = await PatientCase.make(examiner.client, pictures());
		await found.pair(page);
		await ready(page);
		await found.show([picture()]);
		await expect(stage(page).locator('img')).toBeVisible();
		await examiner.client.request('DELETE', `/api/cases/${found.code}/patient-view`);
		await expect(page.getByText('The examiner has ended this patient view')).toBeVisible();
		await expect(page.locator('img')).toHaveCount(0);
		await page.reload();
		await expect(page.getByLabel('Code')).toBeVisible();
	});
});

test('five wrong codes make a screen wait', async ({ page }) => {
	const strict = await start();
	await page.goto(`${strict.url}/patient`);
	for (let tries = 0; tries < 5; tries++) {
		await page.getByLabel('Code').fill(`ABCD-EFG${tries}`);
		await page.getByRole('button', { name: 'Pair this screen' }).click();
		await expect(page.getByText('This code does not fit')).toBeVisible();
		await expect(page.getByRole('button', { name: 'Pair this screen' })).toBeEnabled();
	}
	await page.getByRole('button', { name: 'Pair this screen' }).click();
	await expect(page.getByText(/Five wrong codes\. Wait \d+ min/)).toBeVisible();
	await strict.stop();
});

test.describe('set-up', () => {
	test('loads everything ahead, plays a word at a touch, and tells the examiner', async ({ page }) => {
		const found = await PatientCase.make(examiner.client, [...pictures(), ...words()]);
		await found.pair(page);
		await found.heard(({ unlocked, fullScreen }) => unlocked === false && fullScreen === false);
		await expect(page.getByText('3 of 3 pictures and sounds ready')).toBeVisible();
		expect(await violations(page)).toEqual([]);
		await page.getByRole('button', { name: 'Sound and full screen' }).click();
		await expect(page.getByText('A word was played.')).toBeVisible();
		const told = await found.heard(({ unlocked, fullScreen }) => unlocked === true && fullScreen === true);
		expect(told).toMatchObject({
			visible: true,
			wakeLock: true,
			ready: 3,
			total: 3,
			calibrated: false,
			connected: true
		});
		expect(told.frameAge).toBeGreaterThanOrEqual(0);
	});

	test('counts what could not be loaded, and loads what was added when told', async ({ page }) => {
		const gone: CaseItem = {
			id: 'gone',
			answer: 'gone',
			accepted: [],
			prompts: [picture([{ file: `${'0'.repeat(32)}.webp`, width: 512 }])]
		};
		const found = await PatientCase.make(examiner.client, [gone, pictures()[0]!]);
		const { id, code } = await found.offer();
		await page.goto(`${server.url}/patient#${code}`);
		await page.getByText(/The examiner sees/).waitFor();
		await found.confirm(id);
		await expect(page.getByText('1 of 2 pictures and sounds ready')).toBeVisible();
		await found.note('item-decided', { item: 'gone', task: 'object-naming', language: 'en', keep: false });
		await found.send({ kind: 'prepare' });
		await expect(page.getByText('1 of 1 pictures and sounds ready')).toBeVisible();
	});

	test('measures the screen with a card and sizes items by it', async ({ page }) => {
		const found = await PatientCase.make(examiner.client, pictures());
		await found.pair(page);
		await page.getByRole('button', { name: 'Size' }).click();
		await page.getByRole('button', { name: 'Measure with a card' }).click();
		expect(await violations(page)).toEqual([]);
		const slider = page.getByLabel('Width of the frame');
		await slider.fill('5');
		const card = (await page.getByTestId('card').boundingBox())!;
		// ISO/IEC 7810: ID-1 is 85.60 mm by 53.98 mm
		expect(card.width).toBeCloseTo(85.6 * 5, 0);
		expect(card.height).toBeCloseTo(53.98 * 5, 0);
		await slider.press('ArrowRight');
		await expect(slider).toHaveValue('5.02');
		await slider.fill('5');
		await page.getByRole('button', { name: 'It fits' }).click();
		await found.heard(({ calibrated }) => calibrated === true);
		expect(await page.evaluate(() => getComputedStyle(document.documentElement).getPropertyValue('--mm'))).toBe('5px');
		await found.lay({ degrees: 10, distance: 600 });
		// 10 degrees at 0.6 m are 105 mm, rounded
		await expect.poll(async () => Math.round((await page.getByTestId('preview').boundingBox())!.width / 5)).toBe(105);
		await page.reload();
		await found.heard(({ calibrated }) => calibrated === true);
	});

	test('turns, mirrors and moves by the screen itself, and remembers it', async ({ page }) => {
		const found = await PatientCase.make(examiner.client, pictures());
		await found.pair(page);
		await page.getByRole('button', { name: 'Place' }).click();
		expect(await violations(page)).toEqual([]);
		await page.getByRole('button', { name: 'Turn' }).click();
		await page.getByRole('button', { name: 'Mirror' }).click();
		await page.getByRole('button', { name: 'Move up' }).click();
		const preview = page.getByTestId('preview');
		await expect(preview).toHaveAttribute('style', /scaleX\(-1\) rotate\(90deg\)/);
		const middle = async () => {
			const box = (await preview.boundingBox())!;
			return { x: Math.round(box.x + box.width / 2), y: Math.round(box.y + box.height / 2) };
		};
		expect(await middle()).toEqual({ x: 640, y: 360 });
		await page.mouse.move(640, 360);
		await page.mouse.down();
		await page.mouse.move(900, 300);
		await page.mouse.up();
		expect(await middle()).toEqual({ x: 900, y: 300 });
		await page.reload();
		await expect.poll(middle).toEqual({ x: 900, y: 300 });
	});
});

test.describe('a run', () => {
	test('shows a picture at its time and size, and logs when it was on the screen', async ({ page }) => {
		const found = await PatientCase.make(examiner.client, pictures());
		await found.pair(page);
		await found.lay({ degrees: 10, distance: 600 });
		await ready(page);
		expect(await colours(page)).toEqual([GROUND]);
		const trial = await found.show([picture()]);
		await expect(stage(page).locator('img')).toBeVisible();
		const box = (await stage(page).locator('img').boundingBox())!;
		// 10 degrees at 0.6 m are 105 mm, rounded; a browser's millimetre is 96 / 25.4 px
		expect(Math.round((box.width * 25.4) / 96)).toBe(105);
		expect(box.height).toBe(box.width);
		expect(box.x + box.width / 2).toBeCloseTo(640, 0);
		expect(box.y + box.height / 2).toBeCloseTo(400, 0);
		expect(
			await stage(page)
				.locator('img')
				.evaluate((image: HTMLImageElement) => image.naturalWidth)
		).toBe(512);
		const onset = await found.onset(trial);
		expect(onset).toMatchObject({ shown: true, source: 'presentation-time' });
		expect(Math.abs(Date.parse(onset.planned!) - found.lastShowAt)).toBeLessThanOrEqual(1);
		expect(Date.parse(onset.measured!)).toBeGreaterThan(Date.parse(onset.planned!) - FRAME);
		expect(await page.evaluate(() => crossOriginIsolated)).toBe(true);
	});

	test('takes it off after its time, and is plain ground between items', async ({ page }) => {
		const found = await PatientCase.make(examiner.client, pictures());
		await found.pair(page);
		await ready(page);
		const seen = await watchStage(page);
		await found.show([picture()], { duration: 400 });
		await expect.poll(async () => (await seen()).map(({ items }) => items)).toEqual([1, 0]);
		const [on, off] = await seen();
		expect(off!.at - on!.at).toBeGreaterThan(400 - FRAME);
		expect(await colours(page)).toEqual([GROUND]);
		await found.show([picture()]);
		await expect(stage(page).locator('img')).toBeVisible();
		await found.send({ kind: 'blank' });
		await expect(stage(page).locator('img')).toHaveCount(0);
		expect(await colours(page)).toEqual([GROUND]);
	});

	test('turns, mirrors and moves what it shows', async ({ page }) => {
		const found = await PatientCase.make(examiner.client, pictures());
		await found.pair(page);
		await ready(page);
		await found.lay({});
		await found.show([picture()]);
		await expect(stage(page).locator('img')).toBeVisible();
		const at = async (x: number, y: number) => await colourAt(page, x, y);
		expect([await at(-60, 0), await at(60, 0)]).toEqual([DARK, LIGHT]);
		// A quarter turn clockwise brings what was on the left to the top.
		await found.lay({ turn: 1 });
		await expect.poll(() => at(0, -60)).toEqual(DARK);
		expect(await at(0, 60)).toEqual(LIGHT);
		await found.lay({ turn: 3 });
		await expect.poll(() => at(0, -60)).toEqual(LIGHT);
		await found.lay({ mirrored: true });
		await expect.poll(() => at(-60, 0)).toEqual(LIGHT);
		expect(await at(60, 0)).toEqual(DARK);
		await found.lay({ x: 0.5, y: -0.25 });
		await expect.poll(() => at(0, 0)).toEqual(GROUND);
		expect([await at(320 - 60, -100), await at(320 + 60, -100)]).toEqual([DARK, LIGHT]);
	});

	test('reports what came after its time and never shows it', async ({ page }) => {
		const found = await PatientCase.make(examiner.client, pictures());
		await found.pair(page);
		await ready(page);
		const seen = await watchStage(page);
		const late = await found.show([picture()], { ahead: -40 });
		const farOff = await found.show([picture()], { ahead: 60_000 });
		expect(await found.onset(late)).toMatchObject({ shown: false, reason: 'late' });
		expect(await found.onset(farOff)).toMatchObject({ shown: false, reason: 'too-early' });
		await page.waitForTimeout(400);
		expect(await seen()).toEqual([]);
	});

	test('reports a picture that does not load, and what is overtaken or taken off before its time', async ({ page }) => {
		const found = await PatientCase.make(examiner.client, pictures());
		await found.pair(page);
		await ready(page);
		const seen = await watchStage(page);
		const missing = await found.show([picture([{ file: `${'1'.repeat(32)}.webp`, width: 512 }])]);
		expect(await found.onset(missing)).toMatchObject({ shown: false, reason: 'media' });
		const takenOff = await found.show([picture()], { ahead: 1500 });
		await found.send({ kind: 'blank' });
		expect(await found.onset(takenOff)).toMatchObject({ shown: false, reason: 'taken-off' });
		expect(await seen()).toEqual([]);
	});

	test('shows text large, and nothing of it is selected or answers to a key or the other button', async ({ page }) => {
		const found = await PatientCase.make(examiner.client, pictures());
		await found.pair(page);
		await ready(page);
		const trial = await found.show([text('The boy climbed up to the top of the')]);
		await expect(stage(page).getByText('The boy climbed')).toBeVisible();
		expect(await found.onset(trial)).toMatchObject({ shown: true, source: 'presentation-time' });
		const letters = await stage(page)
			.locator('p')
			.evaluate((element) => parseFloat(getComputedStyle(element).fontSize));
		expect(letters).toBeGreaterThan(24);
		const before = await page.screenshot();
		for (const key of ['Space', 'Enter', 'Tab', 'a', 'Backspace', 'ArrowDown']) await page.keyboard.press(key);
		await page.mouse.click(640, 400, { button: 'right' });
		await page.mouse.dblclick(640, 400);
		expect((await page.screenshot()).equals(before)).toBe(true);
		expect(await page.evaluate(() => String(getSelection()))).toBe('');
		expect(await stage(page).evaluate((element) => getComputedStyle(element).cursor)).toBe('none');
	});

	/** The browser of the tests keeps every page in sight; this is what a page is told when it is covered. */
	async function setHidden(page: Page, hidden: boolean): Promise<void> {
		await page.evaluate((value) => {
			Object.defineProperty(document, 'hidden', { configurable: true, value });
			Object.defineProperty(document, 'visibilityState', { configurable: true, value: value ? 'hidden' : 'visible' });
			document.dispatchEvent(new Event('visibilitychange'));
		}, hidden);
	}

	test('shows nothing while it is hidden, and says so', async ({ page }) => {
		const found = await PatientCase.make(examiner.client, pictures());
		await found.pair(page);
		await ready(page);
		await found.show([picture()]);
		await expect(stage(page).locator('img')).toBeVisible();
		const coming = await found.show([picture()], { ahead: 3000 });
		await setHidden(page, true);
		await found.heard(({ visible }) => visible === false);
		await expect(stage(page).locator('img')).toHaveCount(0);
		expect(await found.onset(coming)).toMatchObject({ shown: false, reason: 'hidden' });
		const hidden = await found.show([picture()]);
		expect(await found.onset(hidden)).toMatchObject({ shown: false, reason: 'hidden' });
		await setHidden(page, false);
		await found.heard(({ visible }) => visible === true);
		expect(await colours(page)).toEqual([GROUND]);
		const again = await found.show([picture()]);
		expect(await found.onset(again)).toMatchObject({ shown: true });
	});

	test('shows nothing late after it was asleep', async ({ page, context }) => {
		const found = await PatientCase.make(examiner.client, pictures());
		await found.pair(page);
		await ready(page);
		const seen = await watchStage(page);
		const devtools = await context.newCDPSession(page);
		await devtools.send('Debugger.enable');
		await devtools.send('Debugger.pause');
		const asleep = await found.show([picture()]);
		await new Promise((done) => setTimeout(done, 1500));
		expect(await found.onsetsOf(asleep)).toEqual([]);
		await devtools.send('Debugger.resume');
		expect(await found.onset(asleep)).toMatchObject({ shown: false, reason: 'late' });
		await page.waitForTimeout(400);
		expect(await seen()).toEqual([]);
	});

	test('gives up what no frame was drawn for in time', async ({ page }) => {
		const found = await PatientCase.make(examiner.client, pictures());
		await found.pair(page);
		await ready(page);
		const seen = await watchStage(page);
		const trial = await found.show([picture()], { ahead: 600 });
		await page.waitForTimeout(300);
		await page.evaluate(() => {
			for (const end = performance.now() + 1200; performance.now() < end;);
		});
		expect(await found.onset(trial)).toMatchObject({ shown: false, reason: 'no-frame' });
		expect(await seen()).toEqual([]);
	});

	test('comes back after a reload without a word', async ({ page }) => {
		const found = await PatientCase.make(examiner.client, pictures());
		await found.pair(page);
		await ready(page);
		await page.reload();
		await found.heard(({ ready: loaded, total, frameAge }) => loaded === total && total === 2 && frameAge! < 500);
		expect(await colours(page)).toEqual([GROUND]);
		const trial = await found.show([picture()]);
		expect(await found.onset(trial)).toMatchObject({ shown: true });
	});

	test('is plain ground when the page fails', async ({ page }) => {
		const found = await PatientCase.make(examiner.client, pictures());
		await found.pair(page);
		await ready(page);
		await found.show([picture()]);
		await expect(stage(page).locator('img')).toBeVisible();
		const waiting = await found.show([picture()], { ahead: 3000 });
		await page.evaluate(() => void setTimeout(() => (null as unknown as () => void)()));
		expect(await found.onset(waiting)).toMatchObject({ shown: false, reason: 'fault' });
		expect(await colours(page)).toEqual([GROUND]);
	});

	test('calls out its number so that its window is found', async ({ page }) => {
		const found = await PatientCase.make(examiner.client, pictures());
		await found.pair(page);
		await ready(page);
		await found.send({ kind: 'identify', text: '42' });
		await expect(page.getByText('42')).toBeVisible();
		await expect(page.getByText('42')).toHaveCount(0);
	});
});

/** Another window of the same computer, as the examiner's is: it speaks straight to the patient view. */
async function staffWindow(context: BrowserContext, patient: Page, view: string) {
	const page = await context.newPage();
	await page.goto(`${server.url}/sign-in`);
	await page.evaluate((name) => {
		const words: unknown[] = [];
		const channel = new BroadcastChannel(`wordkeep patient view ${name}`);
		channel.onmessage = ({ data }) => data.to === 'staff' && words.push(data.word);
		Object.assign(window, { channel, words });
	}, view);
	await patient.bringToFront();
	return {
		page,
		say: (command: DisplayCommand) =>
			page.evaluate((message) => (window as unknown as { channel: BroadcastChannel }).channel.postMessage(message), {
				to: 'patient',
				command
			}),
		words: () => page.evaluate(() => (window as unknown as { words: { kind: string; trial?: string }[] }).words)
	};
}

test.describe('two ways to one screen', () => {
	test('what comes by both is shown once and logged once', async ({ page, context }) => {
		const found = await PatientCase.make(examiner.client, pictures());
		const view = await found.pair(page);
		await ready(page);
		const staff = await staffWindow(context, page, view);
		const seen = await watchStage(page);
		const message = await found.showing([picture()], { duration: 200, ahead: 300 });
		await staff.say(message);
		await found.send(message);
		await expect.poll(async () => (await seen()).map(({ items }) => items)).toEqual([1, 0]);
		expect(await found.onset(message.trial)).toMatchObject({ shown: true });
		await page.waitForTimeout(500);
		expect(await found.onsetsOf(message.trial)).toHaveLength(1);
		expect((await staff.words()).filter(({ trial }) => trial === message.trial)).toEqual([
			{ kind: 'onset', trial: message.trial, shown: true }
		]);
	});

	test('the run goes on by the other window while the server is away, and the log catches up', async ({
		page,
		context
	}) => {
		const found = await PatientCase.make(examiner.client, pictures());
		const view = await found.pair(page);
		await ready(page);
		const staff = await staffWindow(context, page, view);
		const offset = (await found.serverNow()) - Date.now();
		await server.kill();
		await page.waitForTimeout(1500);
		const showing = (trial: string): DisplayCommand => ({
			id: v7(),
			kind: 'show',
			trial,
			showAt: Date.now() + offset + 200,
			duration: null,
			prompts: [picture(media.plain)]
		});
		const trial = v7();
		await staff.say(showing(trial));
		await expect(stage(page).locator('img')).toBeVisible();
		await expect
			.poll(async () => (await staff.words()).filter((word) => word.trial === trial))
			.toEqual([{ kind: 'onset', trial, shown: true }]);
		await staff.say({ id: v7(), kind: 'blank' });
		await expect(stage(page).locator('img')).toHaveCount(0);
		expect(await colours(page)).toEqual([GROUND]);
		server = await start({ dataDir: server.dataDir, port: server.port });
		expect(await found.onset(trial)).toMatchObject({ shown: true, source: 'presentation-time' });
		const after = await found.heard(({ connected, visible }) => connected && visible === true);
		expect(after.view).toBe(view);
		expect(await found.onset(await found.show([picture()]))).toMatchObject({ shown: true });
	});
});

test.describe('sound', () => {
	/** The loudest moment that leaves towards the loudspeaker while `work` goes on: root of the mean square. */
	async function loudness(page: Page, work: () => Promise<void>): Promise<number> {
		await page.evaluate(() => {
			const { ctx, masterGain } = (window as unknown as { Howler: { ctx: AudioContext; masterGain: GainNode } }).Howler;
			const analyser = ctx.createAnalyser();
			masterGain.connect(analyser);
			const samples = new Float32Array(analyser.fftSize);
			const meter = { loudest: 0 };
			setInterval(() => {
				analyser.getFloatTimeDomainData(samples);
				const meanSquare = samples.reduce((sum, sample) => sum + sample * sample, 0) / samples.length;
				meter.loudest = Math.max(meter.loudest, Math.sqrt(meanSquare));
			}, 10);
			Object.assign(window, { meter });
		});
		await work();
		return await page.evaluate(() => (window as unknown as { meter: { loudest: number } }).meter.loudest);
	}

	test('is held back until a real touch, then plays at its time', async ({ page }) => {
		const found = await PatientCase.make(examiner.client, words());
		await found.pair(page);
		await found.heard(({ unlocked }) => unlocked === false);
		const locked = await found.show([sound()]);
		expect(await found.onset(locked)).toMatchObject({ shown: false, reason: 'sound-off' });
		await page.mouse.click(640, 700);
		await found.heard(({ unlocked }) => unlocked === true);
		let trial = '';
		const loudest = await loudness(page, async () => {
			trial = await found.show([sound()]);
			await found.onset(trial);
			await page.waitForTimeout(300);
		});
		// a sine of amplitude 0.5 has an effective value of 0.5 / sqrt(2)
		expect(loudest).toBeCloseTo(0.5 / Math.SQRT2, 2);
		const onset = await found.onset(trial);
		expect(onset).toMatchObject({ shown: true, source: 'audio-clock' });
		expect(Date.parse(onset.measured!)).toBeGreaterThan(Date.parse(onset.planned!) - FRAME);
		expect(await colours(page)).toEqual([GROUND]);
	});

	test('stops when it is taken off', async ({ page }) => {
		const found = await PatientCase.make(examiner.client, words());
		await found.pair(page);
		await page.getByRole('button', { name: 'Sound and full screen' }).click();
		await expect(page.getByText('A word was played.')).toBeVisible();
		await page.waitForTimeout(700);
		const silent = await loudness(page, async () => {
			const trial = await found.show([sound()], { ahead: 800 });
			await found.send({ kind: 'blank' });
			expect(await found.onset(trial)).toMatchObject({ shown: false, reason: 'taken-off' });
			await page.waitForTimeout(1000);
		});
		expect(silent).toBe(0);
	});

	test('asks for one touch after a reload, until an item comes', async ({ page }) => {
		const found = await PatientCase.make(examiner.client, [...words(), ...pictures()]);
		await found.pair(page);
		await ready(page);
		await page.reload();
		await found.heard(({ unlocked, ready: loaded, total }) => unlocked === false && total === 3 && loaded === total);
		await expect(page.getByText('Touch the screen once')).toBeVisible();
		await found.show([picture()]);
		await expect(stage(page).locator('img')).toBeVisible();
		await expect(page.getByText('Touch the screen once')).toHaveCount(0);
		await page.mouse.click(640, 400);
		await found.heard(({ unlocked, fullScreen }) => unlocked === true && fullScreen === true);
		const trial = await found.show([sound()]);
		expect(await found.onset(trial)).toMatchObject({ shown: true, source: 'audio-clock' });
	});
});

test('nothing that reaches the patient view tells an answer, a score or a tag', async ({ page, context }) => {
	const received: string[] = [];
	const bodies: Promise<void>[] = [];
	const devtools = await context.newCDPSession(page);
	await devtools.send('Network.enable');
	devtools.on('Network.eventSourceMessageReceived', ({ eventName, data }) => received.push(`${eventName} ${data}`));
	page.on('response', (response) => {
		received.push(`${response.url()} ${JSON.stringify(response.headers())}`);
		const type = response.headers()['content-type'] ?? '';
		if (response.status() !== 200 || type.startsWith('text/event-stream')) return;
		bodies.push(response.body().then((body) => void received.push(body.toString('latin1'))));
	});
	await page.addInitScript(() => {
		const heard: string[] = [];
		Object.assign(window, { heard });
		window.BroadcastChannel = class extends BroadcastChannel {
			constructor(name: string) {
				super(name);
				heard.push(name);
				this.addEventListener('message', ({ data }) => heard.push(JSON.stringify(data)));
			}
		};
	});

	const item: CaseItem = {
		id: 'plantedid',
		answer: 'plantedanswer',
		accepted: ['plantedother'],
		category: 'plantedcategory',
		prompts: [picture(), text('plantedprompt'), sound()]
	};
	const found = await PatientCase.make(examiner.client, [item]);
	await found.note('tag-placed', { tag: 'Q7X' });
	const view = await found.pair(page);
	await page.getByRole('button', { name: 'Sound and full screen' }).click();
	await ready(page);
	const staff = await staffWindow(context, page, view);
	for (const way of ['server', 'window']) {
		const message = await found.showing(item.prompts, { ahead: 300 });
		await found.note('trial-presented', {
			trial: message.trial,
			item: 'plantedid',
			task: 'object-naming',
			language: 'en',
			tag: 'Q7X',
			stimulated: true,
			milliamps: 3.75
		});
		if (way === 'server') await found.send(message);
		else await staff.say(message);
		expect(await found.onset(message.trial)).toMatchObject({ shown: true });
		await found.note('trial-scored', {
			trial: message.trial,
			score: 'semantic-paraphasia',
			said: 'plantedsaid',
			note: 'plantednote',
			corrects: []
		});
	}
	await page.waitForTimeout(1200);
	await Promise.all(bodies);
	received.push(...(await page.evaluate(() => (window as unknown as { heard: string[] }).heard)));
	const all = received.join('\n');

	// What must have come did: the record is of what reaches the page.
	const expected = ['plantedprompt', media.tone.file, 'heartbeat', view, '"to":"patient"'];
	expect(expected.filter((one) => !all.includes(one))).toEqual([]);
	const secrets = [
		...['plantedid', 'plantedanswer', 'plantedother', 'plantedcategory', 'plantedsaid', 'plantednote'],
		...['Q7X', '3.75', 'semantic', 'paraphasia', 'trial-presented', 'trial-scored', found.code]
	];
	expect(secrets.filter((one) => all.includes(one))).toEqual([]);
	// It has its own cookie, and no other.
	const cookies = await context.cookies();
	expect(cookies.map(({ name }) => name)).toEqual(['wordkeep-patient']);
});

test('works on a tablet that comes over plain http from the network', async () => {
	const browser = await chromium.launch({
		executablePath: process.env.CHROMIUM ?? '/usr/bin/chromium',
		args: ['--no-sandbox', '--disable-gpu', '--host-resolver-rules=MAP wordkeep.clinic 127.0.0.1']
	});
	const page = await browser.newPage({ viewport: { width: 820, height: 1180 }, hasTouch: true });
	const found = await PatientCase.make(examiner.client, [...pictures(), ...words()]);
	await found.pair(page, `http://wordkeep.clinic:${server.port}`);
	expect(await page.evaluate(() => isSecureContext)).toBe(false);
	await page.getByRole('button', { name: 'Sound and full screen' }).tap();
	await found.heard(({ unlocked }) => unlocked === true);
	expect(await found.onset(await found.show([picture()]))).toMatchObject({ shown: true, source: 'presentation-time' });
	expect(await found.onset(await found.show([sound()]))).toMatchObject({ shown: true, source: 'audio-clock' });
	await browser.close();
});
