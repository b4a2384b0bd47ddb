/** What goes wrong in the hands of people: the wrong way back, two windows of one case, a sheet closed half-way. */
import { expect, test, type Page } from '@playwright/test';
import { DemoClinic } from './page-visits';

let clinic: DemoClinic;

test.beforeAll(async ({ browser }) => {
	clinic = await DemoClinic.open(browser);
});

test.afterAll(async () => {
	await clinic.close();
});

/** From a page of one case by links to the same page of another. */
async function goOver(page: Page, code: string, link: string): Promise<void> {
	await page.goto('/cases');
	await page.getByRole('link', { name: code }).click();
	await page.getByRole('link', { name: link, exact: true }).first().click();
}

test('a jump back from one case to another leaves nothing of it on a live page', async () => {
	const page = await clinic.page('examiner');
	const over = page.getByText(/^[a-z]{4}-[a-z]{4}-\d\d$/);
	await goOver(page, clinic.finished, 'Baseline');
	await page.waitForURL(`**/cases/${clinic.finished}/baseline`);
	await expect(over).toHaveText(clinic.finished);
	await page.getByRole('link', { name: 'Back to the case' }).click();
	await page.getByRole('link', { name: 'Cases' }).click();
	await page.getByRole('link', { name: clinic.prepared }).click();
	await page.getByRole('link', { name: 'Baseline', exact: true }).first().click();
	await page.waitForURL(`**/cases/${clinic.prepared}/baseline`);
	await expect(over).toHaveText(clinic.prepared);

	// The menu of the browser's back button skips what lies between.
	await page.evaluate(() => history.go(-4));
	await page.waitForURL(`**/cases/${clinic.finished}/baseline`);
	await expect(over).toHaveText(clinic.finished);
	await page.evaluate(() => history.go(4));
	await page.waitForURL(`**/cases/${clinic.prepared}/baseline`);
	await expect(over).toHaveText(clinic.prepared);
	await page.close();
});

test('back and forward through the parts of two cases', async () => {
	const page = await clinic.page('therapist');
	const heading = page.getByRole('heading', { level: 1 });
	await goOver(page, clinic.finished, 'Tags');
	await expect(page.getByRole('button', { name: /^Take tag \d+ off$/ })).toHaveCount(10);
	await page.getByLabel('Lay tags').fill('not sent');
	await page.getByRole('link', { name: 'Cases' }).click();
	await page.getByRole('link', { name: clinic.prepared }).click();
	await page.getByRole('link', { name: 'Tags', exact: true }).click();
	await expect(page.getByRole('button', { name: /^Take tag \d+ off$/ })).toHaveCount(12);
	await expect(page.getByLabel('Lay tags')).toHaveValue('');
	await page.evaluate(() => history.go(-3));
	await expect(heading).toHaveText(clinic.finished);
	await expect(page.getByRole('button', { name: /^Take tag \d+ off$/ })).toHaveCount(10);
	await page.goBack();
	await expect(page.getByRole('heading', { name: 'What to do next' })).toBeVisible();
	await page.close();
});

test('two windows of one case see each other, and a draft is not overwritten', async () => {
	const found = await clinic.newCase();
	const one = await clinic.page('examiner');
	const two = await clinic.page('examiner');
	await one.goto(`/cases/${found.code}?part=protocol`);
	await two.goto(`/cases/${found.code}?part=protocol`);
	const needed = (page: Page) => page.getByLabel('Valid trials a site needs');
	const pause = (page: Page) => page.getByLabel('Pause between stimulations, in seconds');
	const save = (page: Page) => page.getByRole('button', { name: 'Save the protocol' }).click();
	await needed(two).fill('4');
	await pause(one).fill('7');
	await save(one);
	await expect(two.getByText('The protocol was changed meanwhile on another device.')).toBeVisible();
	await expect(needed(two)).toHaveValue('4');
	await save(two);
	await expect(needed(one)).toHaveValue('4');
	await expect(pause(two)).toHaveValue('7');
	const protocols = (await found.entries()).flatMap((event) => (event.type === 'protocol-set' ? [event.data] : []));
	expect(protocols.map((data) => Object.keys(data))).toEqual([['timing'], ['rule']]);

	// A tag that one window takes off is gone from the other one; what the other does is taken back by itself alone.
	for (const page of [one, two]) await page.getByRole('link', { name: 'Tags', exact: true }).click();
	await one.getByLabel('Lay tags').fill('1 to 3');
	await one.getByRole('button', { name: 'Lay', exact: true }).click();
	await two.getByRole('button', { name: 'Take tag 2 off' }).click();
	await expect(one.getByRole('button', { name: 'Take tag 2 off' })).toHaveCount(0);
	await one.getByRole('button', { name: 'Take back' }).click();
	await expect(two.getByText('No tag is laid yet')).toBeVisible();
	await one.close();
	await two.close();
});

test('a sheet closed half-way gives the focus back, and asks anew when it is opened again', async () => {
	const page = await clinic.page('administrator');
	await page.goto('/people');
	for (const [opener, close] of [
		['Add somebody', () => page.keyboard.press('Escape')],
		['Change Demo Surgeon', () => page.getByRole('button', { name: 'Close' }).click()]
	] as const) {
		const button = page.getByRole('button', { name: opener, exact: true });
		await button.focus();
		await page.keyboard.press('Enter');
		const sheet = page.getByRole('dialog');
		const name = sheet.getByRole('textbox', { name: 'Name' });
		await expect(name).toBeFocused();
		const before = await name.inputValue();
		await name.fill('half a name');
		// The page behind is out of reach: Tab stays in the sheet, or leads to the browser itself.
		for (let presses = 0; presses < 20; presses++) {
			await page.keyboard.press('Tab');
			expect(
				await page.evaluate(
					() => document.activeElement === document.body || !!document.activeElement?.closest('dialog')
				)
			).toBe(true);
		}
		await close();
		await expect(sheet).toHaveCount(0);
		await expect(button).toBeFocused();
		await page.keyboard.press('Enter');
		await expect(name).toHaveValue(before);
		await page.keyboard.press('Escape');
	}
	await page.close();
});
