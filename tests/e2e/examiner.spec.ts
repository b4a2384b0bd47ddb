import { expect, test, type BrowserContext } from '@playwright/test';
import { ERROR_KINDS } from '../../src/lib/mapping/vocabulary';
import { newMember } from '../api/server';
import { openClinic, signIn, TheatreCase, wordItems, type Clinic, type Prepared } from './steps/clinic';
import { Desk } from './steps/desk';
import { PatientScreen } from './steps/patient-screen';

let clinic: Clinic;

test.beforeAll(async () => {
	clinic = await openClinic();
});

test.afterAll(async () => {
	await clinic.server.discard();
});

const OBJECTS = {
	task: 'object-naming',
	language: 'en',
	items: wordItems(['cat', 'drum', 'fork', 'lamp', 'pear', 'sock'])
};
const OBJECTS_DE = {
	task: 'object-naming',
	language: 'de',
	items: wordItems(['Katze', 'Trommel', 'Gabel', 'Lampe', 'Birne', 'Socke'])
};
const TAGS = ['1', '2', '7', '7B', '12'];

async function openDesk(context: BrowserContext, given: Partial<Prepared> = {}) {
	const found = await TheatreCase.prepare(clinic, { tags: TAGS, sets: [OBJECTS], ...given });
	return { found, desk: await Desk.open(context, clinic.examiner, found) };
}

test.describe('choosing a tag', () => {
	test('by one digit, two digits, or a digit and a letter; it clears after each trial', async ({ context }) => {
		const { found, desk } = await openDesk(context);
		for (const tag of ['1', '12', '7B', '7']) {
			await desk.trial(tag, 'Enter');
			await expect(desk.tagButton(tag)).toHaveAttribute('aria-pressed', 'false');
			await expect(desk.page.getByText('show item: type a tag')).toBeVisible();
		}
		await expect.poll(async () => (await found.presented()).map(({ tag }) => tag)).toEqual(['1', '12', '7B', '7']);
	});

	test('Space without a tag only says so', async ({ context }) => {
		const { found, desk } = await openDesk(context);
		await desk.press('Space');
		await expect(desk.hint).toHaveText('Type a tag first. Nothing was shown.');
		await desk.press('9', 'Space');
		await expect(desk.hint).toHaveText('Type a tag first. Nothing was shown.');
		await desk.trial('2', 'Enter');
		await desk.allSaved();
		expect((await found.presented()).map(({ tag }) => tag)).toEqual(['2']);
	});

	test('by touch, and a key after it does what it says', async ({ context }) => {
		const { found, desk } = await openDesk(context);
		await desk.tagButton('7').click();
		await desk.page.getByRole('button', { name: 'Space show item, tag 7' }).click();
		await desk.isNow('7');
		await desk.page.getByRole('button', { name: 'N anomia' }).click();
		await desk.isFree();
		await desk.tagButton('12').click();
		await desk.press('Space');
		await desk.isNow('12');
		await desk.page.getByRole('button', { name: 'Enter intact' }).click();
		await desk.isFree();
		await desk.allSaved();
		expect((await found.presented()).map(({ tag }) => tag)).toEqual(['7', '12']);
		expect((await found.entries('trial-scored')).map(({ score }) => score)).toEqual(['anomia', 'intact']);
	});
});

test.describe('keys in quick succession', () => {
	test('a key that bounces shows one item', async ({ context }) => {
		const { found, desk } = await openDesk(context);
		await desk.typeTag('2');
		await desk.pressAtOnce('Space', 'Space', 'Space');
		await desk.isNow('2');
		await desk.score('Enter');
		await desk.allSaved();
		expect((await found.presented()).map(({ tag }) => tag)).toEqual(['2']);
		expect(await found.entries('run-opened')).toHaveLength(1);
	});

	test('every key does its part in the order it was pressed, however slowly the device saves', async ({ context }) => {
		const { found, desk } = await openDesk(context);
		await desk.trial('1', 'Enter');
		await desk.pressAtOnce('Digit2', 'Space', 'KeyN', 'Digit7', 'Space', 'KeyS', 'Digit1', 'Digit2', 'Space', 'Enter');
		await expect(desk.lastTrials).toHaveCount(4);
		await desk.isFree();
		await desk.allSaved();
		expect((await found.presented()).map(({ tag }) => tag)).toEqual(['1', '2', '7', '12']);
		const trials = (await found.presented()).map(({ trial }) => trial);
		const scores = await found.entries('trial-scored');
		expect(scores.map(({ trial, score }) => [trials.indexOf(trial), score])).toEqual([
			[0, 'intact'],
			[1, 'anomia'],
			[2, 'semantic-paraphasia'],
			[3, 'intact']
		]);
	});

	test('Backspace twice at once takes back the score and the trial; the redo brings both back', async ({ context }) => {
		const { found, desk } = await openDesk(context);
		await desk.trial('1', 'n');
		await desk.pressAtOnce('Backspace', 'Backspace');
		await expect(desk.lastTrials).toHaveCount(0);
		await expect(desk.hint).toHaveText('Trial taken back.');
		await desk.allSaved();
		expect((await found.map()).sites).toEqual([]);
		await desk.press('Shift+Backspace');
		await desk.isNow('1');
		await desk.press('Shift+Backspace');
		await desk.isFree();
		await expect(desk.lastTrials).toHaveText([/\w+\s*anomia/]);
	});
});

test.describe('scoring', () => {
	test('every kind of the protocol has a key of its own, and the key scores it', async ({ context }) => {
		const { found, desk } = await openDesk(context, { protocol: { kinds: [...ERROR_KINDS] } });
		const keys = desk.page.getByRole('group', { name: 'not scored yet' }).getByRole('button');
		// Afterdischarge and seizure have their keys among the commands; intact stands before the kinds.
		await expect(keys).toHaveCount(ERROR_KINDS.length - 2 + 1);
		const caps = await keys.locator('kbd').allTextContents();
		const commands = await desk.page.locator('kbd').allTextContents();
		expect(new Set(caps).size).toBe(caps.length);
		for (const cap of caps) expect(commands.filter((other) => other === cap)).toHaveLength(1);
		for (const [kind, name] of [
			['counting-error', 'counting error'],
			['negative-motor', 'negative motor response'],
			['inattentive', 'inattentive']
		] as const) {
			const cap = await keys.filter({ hasText: name }).locator('kbd').textContent();
			await desk.trial('2', cap!.length > 1 ? cap! : cap!.toLowerCase());
			await desk.allSaved();
			expect((await found.entries('trial-scored')).at(-1)).toMatchObject({ score: kind });
		}
	});

	test('what the patient said is noted before the score or after it, in one key', async ({ context }) => {
		const { found, desk } = await openDesk(context);
		await desk.show('1');
		await desk.press(',');
		await desk.page.keyboard.type('dog 2');
		await desk.press('Enter');
		await expect(desk.card.getByText('“dog 2”')).toBeVisible();
		await desk.score('s');
		await expect(desk.lastTrials).toHaveText([/\w+\s*semantic: “dog 2”/]);
		await desk.press('ArrowUp', ',');
		await desk.page.getByLabel('What the patient said').fill('fox');
		await desk.press('Enter', 'Escape');
		await expect(desk.lastTrials).toHaveText([/\w+\s*semantic: “fox”/]);
		await desk.allSaved();
		expect((await found.entries('trial-scored')).map(({ score, said }) => [score, said])).toEqual([
			['semantic-paraphasia', 'dog 2'],
			['semantic-paraphasia', 'fox']
		]);
	});

	test('a key without a trial scores nothing', async ({ context }) => {
		const { found, desk } = await openDesk(context);
		await desk.trial('1', 'Enter');
		await desk.press('n');
		await expect(desk.hint).toHaveText(/^No trial waits for a score/);
		await desk.allSaved();
		expect(await found.entries('trial-scored')).toHaveLength(1);
	});

	test('an earlier trial is scored anew, moved to another tag, made a control, given its current', async ({
		context
	}) => {
		const { found, desk } = await openDesk(context);
		for (const tag of ['1', '2', '7']) await desk.trial(tag, 'n');
		await desk.press('ArrowUp', 'ArrowUp');
		await expect(desk.card.getByText('earlier trial')).toBeVisible();
		await expect(desk.card.getByText('tag 2', { exact: true })).toBeVisible();
		await desk.typeTag('12');
		await desk.press('.');
		await expect(desk.card.getByText('tag 12', { exact: true })).toBeVisible();
		await desk.score('Enter');
		await desk.press('ArrowUp');
		await desk.page.getByLabel('Current in mA, zero to peak').fill('2,5');
		await desk.press('Enter');
		await expect(desk.card.getByText(/2\.5 mA/)).toBeVisible();
		await desk.press('Escape');
		await desk.isFree();
		await desk.press('ArrowUp', 'ArrowUp', 'ArrowUp');
		await desk.page.getByRole('button', { name: 'it was a control' }).click();
		await expect(desk.card.getByText('control', { exact: true })).toBeVisible();
		await desk.press('Escape');
		await desk.allSaved();
		expect((await found.map()).sites).toMatchObject([
			{ tag: '7', disturbed: 1, valid: 1, milliamps: [2.5, 2.5] },
			{ tag: '12', disturbed: 0, valid: 1, milliamps: null }
		]);
		await expect(desk.page.getByText('1 of 1', { exact: true })).toBeVisible();
	});
});

test.describe('items', () => {
	test('one that was seen at a tag is not offered there again in any language while others remain', async ({
		context
	}) => {
		const few = 3;
		const { found, desk } = await openDesk(context, {
			sets: [OBJECTS, OBJECTS_DE].map((set) => ({ ...set, items: set.items.slice(0, few) }))
		});
		await desk.trial('7', 'Enter');
		await desk.press('l');
		await expect(desk.card.getByText('next, object naming, German')).toBeVisible();
		await desk.trial('7', 'Enter');
		await desk.press('l');
		await desk.trial('7', 'Enter');
		await desk.typeTag('7');
		await expect(desk.page.getByText('seen at this tag before: no other item remains')).toBeVisible();
		await desk.allSaved();
		const shown = await found.presented();
		expect(shown.map(({ language }) => language)).toEqual(['en', 'de', 'en']);
		expect(new Set(shown.map(({ item }) => item)).size).toBe(few);
	});

	test('one is skipped, and the order is shuffled', async ({ context }) => {
		const items = wordItems(Array.from({ length: 40 }, (_, index) => `word ${index + 1}`));
		const { found, desk } = await openDesk(context, { sets: [{ ...OBJECTS, items }] });
		const next = desk.card.getByText(/^word \d+$/);
		const first = (await next.textContent())!;
		await desk.press('k');
		await expect(next).not.toHaveText(first);
		const second = (await next.textContent())!;
		await desk.trial('1', 'Enter');
		await desk.allSaved();
		const [trial] = await found.presented();
		expect(items.find(({ id }) => id === trial!.item)!.answer).toBe(second);
		// Forty items: one shuffle in forty would leave the same one first.
		const seen = new Set<string>();
		for (let times = 0; times < 4; times++) {
			await desk.page.getByRole('button', { name: 'shuffle the order' }).click();
			seen.add((await next.textContent())!);
		}
		expect(seen.size).toBeGreaterThan(1);
	});

	test('a control has its own key and no tag', async ({ context }) => {
		const { found, desk } = await openDesk(context);
		await desk.typeTag('7');
		await desk.trial(null, 'n');
		await desk.allSaved();
		expect(await found.presented()).toMatchObject([{ tag: null, stimulated: false, milliamps: null }]);
		expect((await found.map()).sites).toEqual([]);
		await expect(desk.page.getByText('1 of 1', { exact: true })).toBeVisible();
	});

	test('while the patient counts the prompt stays, and each press marks a stimulation', async ({ context }) => {
		const series = [
			{ id: 'up', answer: 'one, two', accepted: [], prompts: [{ kind: 'text' as const, text: 'Count' }] },
			{ id: 'days', answer: 'Monday', accepted: [], prompts: [{ kind: 'text' as const, text: 'Say the days' }] }
		];
		const { found, desk } = await openDesk(context, { sets: [{ task: 'counting', language: 'en', items: series }] });
		const screen = await PatientScreen.pair(context, desk);
		await desk.trial('1', 'Enter');
		await screen.shows('Count');
		for (const tag of ['2', '7']) {
			await desk.typeTag(tag);
			await expect(desk.page.getByText(`mark stimulation, tag ${tag}`)).toBeVisible();
			await desk.press('Space');
			await desk.isNow(tag);
			await desk.score('a');
			await screen.shows('Count');
		}
		await desk.press('k');
		await desk.trial('12', 'Enter');
		await screen.shows('Say the days');
		await desk.press('b');
		await screen.isBlank();
		await desk.allSaved();
		expect((await found.presented()).map(({ tag, item, showAt }) => [tag, item, showAt !== undefined])).toEqual([
			['1', 'up', true],
			['2', 'up', false],
			['7', 'up', false],
			['12', 'days', true]
		]);
		expect(await found.entries('trial-onset')).toHaveLength(2);
	});
});

test.describe('the current', () => {
	test('is one key away, kept with each trial, and stays over a reload', async ({ context }) => {
		const { found, desk } = await openDesk(context);
		const field = desk.page.getByLabel('Current in mA, zero to peak');
		await desk.press('m');
		await field.fill('3,5');
		await desk.press('Enter');
		await expect(desk.page.getByRole('button', { name: '3.5 mA' })).toBeVisible();
		await desk.trial('1', 'Enter');
		await desk.press('m', 'ArrowUp', 'Enter');
		await desk.trial('2', 'Enter');
		await desk.press('m');
		await field.fill('9');
		await desk.press('Escape');
		await expect(desk.page.getByRole('button', { name: '4.0 mA' })).toBeVisible();
		await desk.reload();
		await expect(desk.page.getByRole('button', { name: '4.0 mA' })).toBeVisible();
		await desk.allSaved();
		expect((await found.presented()).map(({ milliamps }) => milliamps)).toEqual([3.5, 4]);
	});
});

test.describe('cautions', () => {
	test('the same tag twice in a row', async ({ context }) => {
		const { desk } = await openDesk(context);
		const caution = desk.page.getByText(/^Same tag as the last stimulation/);
		await desk.trial('2', 'Enter');
		await desk.typeTag('7');
		await expect(caution).toHaveCount(0);
		await desk.press('2');
		await expect(caution).toBeVisible();
		await desk.trial(null, 'Enter');
		await desk.typeTag('2');
		await expect(caution).toBeVisible();
		await desk.trial('2', 'Enter');
	});

	test('an afterdischarge: the trial does not count, and what to do stands there', async ({ context }) => {
		const { found, desk } = await openDesk(context);
		await desk.trial('2', 'n');
		await desk.press('g');
		await expect(desk.page.getByText(/Stop, wait about a minute, then lower the current/)).toBeVisible();
		await expect(desk.lastTrials).toHaveText([/not counted: afterdischarge \(anomia\)/]);
		await desk.trial('7', 'Enter');
		await desk.allSaved();
		expect((await found.map()).sites).toMatchObject([
			{ tag: '2', valid: 0, excluded: 1 },
			{ tag: '7', valid: 1, excluded: 0 }
		]);
	});

	test('a seizure: nothing counts until it is over, what to do stands there, and the run is not stopped', async ({
		context
	}) => {
		const { found, desk } = await openDesk(context);
		await desk.trial('1', 'Enter');
		await desk.show('2');
		await desk.press('z');
		const said = desk.page.getByText(/Stop stimulating\. Cold saline or Ringer on the cortex/);
		await expect(said).toBeVisible();
		await desk.trial('7', 'n');
		await desk.trial(null, 'n');
		await desk.press('z');
		await expect(said).toHaveCount(0);
		await desk.trial('12', 'n');
		await desk.allSaved();
		expect((await found.map()).sites).toMatchObject([
			{ tag: '1', valid: 1, excluded: 0 },
			{ tag: '2', valid: 0, excluded: 1 },
			{ tag: '7', valid: 0, excluded: 1 },
			{ tag: '12', valid: 1, excluded: 0 }
		]);
		await expect(desk.page.getByText('0 of 0', { exact: true })).toBeVisible();
	});
});

test.describe('keys', () => {
	async function keysPanel(desk: Desk) {
		const panel = desk.page.getByRole('region', { name: 'Change keys' });
		await desk.page.getByRole('button', { name: 'keys', exact: true }).click();
		return {
			panel,
			give: async (name: string, key: string) => {
				await panel.getByRole('button', { name }).click();
				await desk.press(key);
			},
			close: () => panel.getByRole('button', { name: 'close' }).click()
		};
	}

	test('are changed on this device; no key does two things', async ({ context }) => {
		const { found, desk } = await openDesk(context);
		const { panel, give, close } = await keysPanel(desk);
		await give('anomia', 'y');
		await give('skip item', 'b');
		await expect(panel.getByRole('button', { name: 'B skip item' })).toBeVisible();
		await expect(panel.getByRole('button', { name: 'K blank view' })).toBeVisible();
		await give('dysarthria', 'c');
		await expect(panel.getByText('C is the key for “control”. Change that one first.')).toBeVisible();
		await give('control', 's');
		await close();
		const caps = await desk.page.getByRole('group').locator('kbd').allTextContents();
		expect(caps.filter((cap) => cap === 'S')).toHaveLength(1);
		await desk.reload();
		await desk.trial('1', 'y');
		await desk.press('s');
		await desk.isNow(null);
		await desk.score('Enter');
		await desk.allSaved();
		expect((await found.entries('trial-scored')).map(({ score }) => score)).toEqual(['anomia', 'intact']);
		const again = await keysPanel(desk);
		await again.panel.getByRole('button', { name: 'as delivered' }).click();
		await expect(again.panel.getByRole('button', { name: 'N anomia' })).toBeVisible();
	});

	test('of the number pad alone run a mapping with one hand', async ({ context }) => {
		const { found, desk } = await openDesk(context);
		const { panel, close } = await keysPanel(desk);
		await panel.getByRole('checkbox').check();
		await close();
		const pad = (...names: string[]) => desk.press(...names.map((name) => `Numpad${name}`));
		await pad('1', '2', 'Enter');
		await desk.isNow('12');
		await pad('Enter');
		await desk.isFree();
		await pad('7', 'Enter');
		await desk.isNow('7');
		// Speech arrest, anomia: the second kind of the list is on 2.
		await pad('2');
		await desk.isFree();
		await pad('Add');
		await desk.isNow(null);
		await pad('Multiply');
		await expect(desk.page.getByRole('button', { name: '1 not scorable' })).toBeVisible();
		await pad('9', '0');
		await desk.isNow(null);
		await pad('1');
		await desk.isFree();
		await pad('Subtract');
		await desk.isNow(null);
		await pad('Enter');
		await desk.isFree();
		await desk.allSaved();
		expect((await found.presented()).map(({ tag }) => tag)).toEqual(['12', '7', null]);
		expect((await found.entries('trial-scored')).map(({ score }) => score)).toEqual([
			'intact',
			'anomia',
			'not-scorable',
			'intact'
		]);
	});
});

test.describe('the patient view', () => {
	test('that does not confirm within half a second is asked about, and the answer holds', async ({ context }) => {
		const { found, desk } = await openDesk(context, { timing: { shown: null, pause: 0, lead: 100 } });
		const screen = await PatientScreen.pair(context, desk);
		await screen.trial(desk, '1', 'Enter');
		const asked = desk.page.getByText(/The patient view has not confirmed “\w+”\. Was it shown\?/);
		await expect(asked).toHaveCount(0);
		await screen.page.close();
		await desk.typeTag('2');
		const pressed = Date.now();
		await desk.press('Space');
		await expect(asked).toBeVisible();
		// 100 ms ahead, 500 ms to confirm: never asked before; how much later is the machine's.
		expect(Date.now() - pressed).toBeGreaterThan(500);
		await desk.press('-');
		await expect(asked).toHaveCount(0);
		await desk.isFree();
		await expect(desk.lastTrials.first()).toContainText('not counted: not shown');
		await desk.show('7');
		await desk.score('n');
		await expect(asked).toBeVisible();
		await desk.page.getByRole('button', { name: /it was shown/ }).click();
		await expect(asked).toHaveCount(0);
		await desk.allSaved();
		expect((await found.map()).sites).toMatchObject([
			{ tag: '1', valid: 1, excluded: 0 },
			{ tag: '2', valid: 0, excluded: 1 },
			{ tag: '7', valid: 1, disturbed: 1, excluded: 0 }
		]);
	});

	test('stands in the status line: on screen, hidden, lost within about 2 s, back again', async ({
		context,
		browser
	}) => {
		const { desk } = await openDesk(context);
		await expect(desk.patientStatus).toContainText('not paired');
		const tablet = await browser.newContext();
		const screen = await PatientScreen.pair(tablet, desk);
		await expect(desk.patientStatus).toContainText('on screen');
		// The browser of the tests keeps every page in sight; this is what a page is told when another one is before it.
		const hide = (hidden: boolean) =>
			screen.page.evaluate((value) => {
				Object.defineProperty(document, 'hidden', { configurable: true, value });
				document.dispatchEvent(new Event('visibilitychange'));
			}, hidden);
		await hide(true);
		await expect(desk.patientStatus).toContainText('hidden by another window, or asleep');
		await hide(false);
		await expect(desk.patientStatus).toContainText('on screen');
		await tablet.setOffline(true);
		await expect(desk.patientStatus).toContainText('lost: no word from it');
		await tablet.setOffline(false);
		await expect(desk.patientStatus).toContainText('on screen');
		await tablet.close();
		await expect(desk.patientStatus).toContainText('lost: no word from it');
	});
});

test.describe('more than one', () => {
	test('another device takes over; the first one says so and shows nothing', async ({ context, browser }) => {
		const { found, desk } = await openDesk(context);
		await desk.trial('1', 'Enter');
		await desk.allSaved();
		const second = await browser.newContext();
		const other = await Desk.open(second, clinic.examiner, found);
		await other.typeTag('2');
		await other.press('Space');
		await expect(other.hint).toContainText('Another device leads this mapping. Take over to show items here.');
		await other.page.getByRole('button', { name: 'take over here' }).click();
		await other.press('Space');
		await other.isNow('2');
		await other.score('n');
		await expect(desk.page.getByText('Another device leads this mapping.', { exact: true })).toBeVisible();
		await desk.typeTag('7');
		await desk.press('Space');
		await expect(desk.hint).toContainText('Another device leads this mapping.');
		await expect(desk.lastTrials).toHaveCount(2);
		await other.allSaved();
		expect((await found.presented()).map(({ tag }) => tag)).toEqual(['1', '2']);
		await second.close();
	});

	test('a role that does not score is refused the page', async ({ browser }) => {
		const reviewer = await newMember(clinic.server, clinic.administrator, 'reviewer', ['reviewer']);
		const found = await TheatreCase.prepare(clinic, { tags: TAGS, sets: [OBJECTS], team: [reviewer] });
		for (const [member, status] of [
			[clinic.surgeon, 403],
			[reviewer, 403],
			[clinic.administrator, 404]
		] as const) {
			const context = await browser.newContext();
			await signIn(context, member);
			const page = await context.newPage();
			const answer = await page.goto(`${clinic.server.url}/cases/${found.code}/examiner`);
			expect(answer!.status()).toBe(status);
			await expect(page.getByRole('button')).toHaveCount(0);
			const sent = await member.client.post(`/api/cases/${found.code}/events`, { events: [] });
			expect(sent.status).toBe(status);
			await context.close();
		}
	});
});

test('nothing blocks a run: with every panel open and a seizure on, keys show and score', async ({ context }) => {
	const { found, desk } = await openDesk(context);
	let dialogs = 0;
	desk.page.on('dialog', (dialog) => {
		dialogs++;
		void dialog.dismiss();
	});
	for (const open of [
		() => desk.patientStatus.click(),
		() => desk.page.getByRole('button', { name: 'keys', exact: true }).click(),
		() => desk.press('z')
	]) {
		await open();
		await desk.trial('7', 'Enter');
		await expect(desk.page.getByRole('dialog')).toHaveCount(0);
	}
	await desk.allSaved();
	expect(await found.presented()).toHaveLength(3);
	expect(dialogs).toBe(0);
});
