/** Everything from an empty installation to an exported result, by the pages alone, each person at a device of their own. */
import { parse } from 'csv-parse/sync';
import { expect, test, type Browser, type BrowserContext, type Download, type Page } from '@playwright/test';
import { execFile } from 'node:child_process';
import { readFile } from 'node:fs/promises';
import { promisify } from 'node:util';
import type { EventData, EventType, LogEvent } from '../../src/lib/mapping/events';
import { startServer, type Server } from '../api/server';

const PASSWORD = 'four invented words here';

let server: Server;

test.beforeAll(async () => {
	server = await startServer();
});

test.afterAll(async () => {
	await server.discard();
});

/** A device of its own: nothing in common with any other. */
async function newDevice(browser: Browser): Promise<Page> {
	return await (await browser.newContext({ baseURL: server.url })).newPage();
}

/** The administrator makes an account and gets the link to hand on. */
async function makeAccount(page: Page, name: string, role: string): Promise<string> {
	await page.getByRole('button', { name: 'Add somebody' }).click();
	const sheet = page.getByRole('dialog');
	await sheet.getByLabel('Name').fill(name);
	await sheet.getByLabel('E-mail address').fill(`${role}@clinic.invalid`);
	await sheet.getByLabel(role).check();
	await sheet.getByRole('button', { name: 'Add and make a link' }).click();
	const link = await sheet.getByLabel(`One-time link for ${name}`).inputValue();
	await sheet.getByRole('button', { name: 'Done' }).click();
	return link;
}

/** Somebody opens the link that was handed to them and chooses a password. */
async function join(page: Page, link: string, name: string): Promise<void> {
	await page.goto(link);
	await expect(page.getByRole('heading', { name: `Welcome, ${name}` })).toBeVisible();
	await page.getByLabel('New password').fill(PASSWORD);
	await page.getByRole('button', { name: 'Save and sign in' }).click();
	await expect(page.getByRole('heading', { name: 'Cases' })).toBeVisible();
}

async function openPart(page: Page, part: string): Promise<void> {
	await page.getByRole('navigation', { name: 'Parts of the case' }).getByRole('link', { name: part }).click();
}

const isSaved = (page: Page) => expect(page.getByText('saved on the server', { exact: true })).toBeVisible();

/** What a page of the clinic answers somebody who may not open it. */
async function isRefused(page: Page, address: string, status: number, reason: string): Promise<void> {
	const answer = await page.goto(address);
	expect(answer!.status()).toBe(status);
	await expect(page.getByRole('heading', { name: reason })).toBeVisible();
}

/** Pairs the screen before the patient with the code on the therapist's screen. */
async function pair(staff: Page, patient: Page): Promise<void> {
	await staff.getByRole('button', { name: 'Pair or set up' }).click();
	const panel = staff.getByRole('region', { name: 'patient view' });
	await panel.getByRole('button', { name: 'pair a patient view' }).click();
	const code = await panel.getByText(/^[0-9A-Z]{4}-?[0-9A-Z]{4}$/).textContent();
	await patient.goto('/patient');
	await patient.getByLabel('Code').fill(code!);
	await patient.getByRole('button', { name: 'Pair this screen' }).click();
	const seen = await patient.getByText(/^The examiner sees \d\d too$/).textContent();
	await expect(panel.getByText(`It must show ${/\d\d/.exec(seen!)![0]}.`)).toBeVisible();
	await panel.getByRole('button', { name: 'yes, this is it' }).click();
	await patient.getByRole('button', { name: 'Sound and full screen' }).click();
	await patient.getByRole('button', { name: 'Ready' }).click();
	await expect(staff.getByText('Patient view: on screen')).toBeVisible();
	await panel.getByRole('button', { name: 'close' }).click();
}

async function logOf(context: BrowserContext, code: string): Promise<LogEvent[]> {
	const answer = await context.request.get(`${server.url}/api/cases/${code}/events`);
	return ((await answer.json()) as { events: LogEvent[] }).events;
}

function entries<T extends EventType>(log: LogEvent[], type: T): EventData[T][] {
	return log.filter((event) => event.type === type).map(({ data }) => data as EventData[T]);
}

const run = promisify(execFile);

/** The mapping, key by key: the tag, the key that scores. A tag of null is a control. */
const OBJECTS: [tag: string | null, key: string][] = [
	[null, 'Enter'],
	['1', 'n'],
	['2', 'Enter'],
	['1', 's'],
	['2', 'n'],
	['1', 'Enter'],
	['2', 'Enter'],
	[null, 'n'],
	['2', 'Enter']
];

/**
 * Worked out by hand from the rule (3 valid trials, two thirds of them disturbed) over the trials above and two
 * stimulations in counting. Tag 2's second trial is followed by an afterdischarge and does not count.
 */
const RESULTS = [
	{ tag: '1', task: 'object-naming', language: 'en', disturbed: 2, valid: 3, excluded: 0, verdict: 'positive' },
	{ tag: '2', task: 'object-naming', language: 'en', disturbed: 0, valid: 3, excluded: 1, verdict: 'negative' },
	{ tag: '3', task: 'counting', language: 'en', disturbed: 1, valid: 2, excluded: 0, verdict: 'open' }
];

test('from an empty installation to an exported result', async ({ browser }, info) => {
	test.setTimeout(180_000);
	const [administrator, examiner, surgeon, patient] = await Promise.all(
		Array.from({ length: 4 }, () => newDevice(browser))
	);
	if (!administrator || !examiner || !surgeon || !patient) throw new Error('a device is missing');

	// The printed link makes the first administrator, once.
	await administrator.goto(server.setUp!);
	await administrator.getByLabel('Name').fill('Ada Invented');
	await administrator.getByLabel('E-mail address').fill('administrator@clinic.invalid');
	await administrator.getByLabel('Password').fill(PASSWORD);
	await administrator.getByRole('button', { name: 'Make the account' }).click();
	await expect(administrator.getByText('There is no case yet')).toBeVisible();
	await isRefused(surgeon, server.setUp!, 404, 'This link does not work any more');

	// Two accounts by one-time links, each good once.
	await administrator.getByRole('link', { name: 'People' }).click();
	const forExaminer = await makeAccount(administrator, 'Eva Invented', 'examiner');
	const forSurgeon = await makeAccount(administrator, 'Sam Invented', 'surgeon');
	await join(examiner, forExaminer, 'Eva Invented');
	await join(surgeon, forSurgeon, 'Sam Invented');
	await isRefused(patient, forSurgeon, 404, 'This link was used already');
	await isRefused(examiner, '/people', 403, 'Your role does not allow this.');
	await isRefused(surgeon, '/cases/new', 403, 'Your role does not allow this.');

	// The examiner makes the case and prepares it.
	await examiner.goto('/cases');
	await examiner.getByRole('link', { name: 'New case' }).first().click();
	await examiner.getByLabel('left hemisphere').check();
	await examiner.getByLabel('Languages to be tested').fill('English');
	await examiner.getByRole('option', { name: 'English' }).first().click();
	await examiner.getByRole('button', { name: 'Make the case' }).click();
	await examiner.waitForURL(/\/cases\/[a-z]{4}-[a-z]{4}-\d\d$/);
	const code = examiner.url().split('/').at(-1)!;
	await openPart(examiner, 'Items');
	for (const set of ['Objects, English', 'Counting and other series, English']) {
		await examiner.getByRole('button', { name: `Add ${set}` }).click();
		await expect(examiner.getByText(`items added from ${set}`)).toBeVisible();
	}
	// A busy machine needs more than the usual 100 ms to pass an item on.
	await openPart(examiner, 'Protocol');
	await examiner.getByLabel('Sent ahead, in milliseconds').fill('400');
	await examiner.getByRole('button', { name: 'Save the protocol' }).click();
	await expect(examiner.getByText('Protocol changed')).toBeVisible();
	await openPart(examiner, 'Tags');
	await examiner.getByLabel('Lay tags').fill('1 to 3');
	await examiner.getByRole('button', { name: 'Lay', exact: true }).click();
	await expect(examiner.getByText('3 tags laid')).toBeVisible();
	await isSaved(examiner);

	// A baseline round on the patient view; what the patient cannot name is dropped.
	const picture = patient.getByTestId('stage').locator('img');
	await examiner.getByRole('link', { name: 'Baseline' }).click();
	await examiner.getByRole('button', { name: 'Begin round 1' }).click();
	await pair(examiner, patient);
	const item = examiner.getByRole('heading', { level: 2 }).first();
	const tried: string[] = [];
	for (const key of ['Enter', 'n', 'Enter']) {
		const name = (await item.textContent())!;
		await examiner.keyboard.press('Space');
		await expect(picture).toBeVisible();
		await examiner.keyboard.press(key);
		await expect(item).not.toHaveText(name);
		await expect(picture).toHaveCount(0);
		tried.push(name);
	}
	await examiner.getByRole('button', { name: 'End round 1' }).click();
	const dropped = tried[1]!;
	await examiner.getByRole('button', { name: 'Follow the rule: drop 1' }).click();
	await expect(examiner.getByRole('row', { name: new RegExp(`^${dropped} .*dropped`) })).toBeVisible();
	await isSaved(examiner);

	// The mapping, by the keyboard alone.
	await examiner.getByRole('link', { name: 'Back to the case' }).click();
	await examiner.getByRole('link', { name: 'Examiner view' }).click();
	const desk = examiner.getByRole('main');
	const trials = examiner.getByRole('region', { name: 'last trials' }).getByRole('listitem');
	await expect(examiner.getByRole('button', { name: /^patient view/ })).toContainText('on screen');
	await examiner.keyboard.press('m');
	await examiner.keyboard.type('3');
	await examiner.keyboard.press('Enter');

	// Skipped through once, every item of the set is offered but the one that was dropped.
	const copied = entries(await logOf(examiner.context(), code), 'items-copied').flatMap(({ task, items }) =>
		task === 'object-naming' ? items.map(({ answer }) => answer) : []
	);
	expect(copied).toContain(dropped);
	const offered: string[] = [];
	const next = desk.locator('.caption + p');
	while (offered.length < copied.length - 1) {
		const answer = (await next.textContent())!;
		offered.push(answer);
		await examiner.keyboard.press('k');
		await expect(next).not.toHaveText(answer);
	}
	expect(offered.sort()).toEqual(copied.filter((answer) => answer !== dropped).sort());

	for (const [at, [tag, key]] of OBJECTS.entries()) {
		await examiner.keyboard.press(tag ?? 'c');
		if (tag !== null) await examiner.keyboard.press('Space');
		await expect(desk.getByText('now', { exact: true })).toBeVisible();
		await expect(picture).toBeVisible();
		await examiner.keyboard.press(key);
		await expect(desk.getByText(/^next, /)).toBeVisible();
		await expect(picture).toHaveCount(0);
		await expect(trials).toHaveCount(at + 1);
		if (at === 4) await examiner.keyboard.press('g');
	}
	await examiner.keyboard.press('j');
	await expect(desk.getByText('next, counting')).toBeVisible();
	for (const key of ['a', 'Enter']) {
		await examiner.keyboard.press('3');
		await examiner.keyboard.press('Space');
		await expect(desk.getByText('now', { exact: true })).toBeVisible();
		await expect(patient.getByTestId('stage')).not.toBeEmpty();
		await examiner.keyboard.press(key);
		await expect(desk.getByText(/^next, /)).toBeVisible();
	}
	await expect(examiner.locator('footer').getByText(/saved on the server/)).toBeVisible();

	// A surgeon reads a case once on its team, and reads alone; an administrator sees who is on it and nothing else.
	await isRefused(surgeon, `/cases/${code}/surgeon`, 404, 'There is no such case, or you are not on its team.');
	await administrator.goto(`/cases/${code}?part=log`);
	await expect(administrator.getByText('You see who is on this case, not what is in it.')).toBeVisible();
	await expect(administrator.getByText('Tag 1 laid')).toHaveCount(0);
	const peeked = await administrator.context().request.get(`${server.url}/api/cases/${code}/events`);
	expect(peeked.status()).toBe(404);
	await administrator.getByRole('group', { name: 'Team' }).getByLabel('Sam Invented').check();
	await administrator.getByRole('button', { name: 'Save the team' }).click();
	await expect(administrator.getByText('Team changed')).toBeVisible();
	for (const view of ['examiner', 'baseline']) {
		await isRefused(surgeon, `/cases/${code}/${view}`, 403, 'Your role does not allow this.');
	}

	await surgeon.setViewportSize({ width: 1920, height: 1080 });
	await surgeon.goto('/cases');
	await surgeon.getByRole('link', { name: code }).click();
	await surgeon.getByRole('link', { name: 'Surgeon screen' }).click();
	const rings = surgeon.getByRole('list', { name: 'Results of all tags' }).getByRole('listitem');
	await expect(rings).toHaveCount(3);
	for (const [at, name] of [
		'tag 1, positive, 2 of 3 disturbed',
		'tag 2, negative, 0 of 3 disturbed, 1 not counted',
		'tag 3, open, 1 of 2 disturbed'
	].entries()) {
		await expect(rings.nth(at).getByRole('img').first()).toHaveAccessibleName(name);
	}

	// What is exported gives the same results again, and the case log is whole.
	await examiner.goto(`/cases/${code}?part=results`);
	const save = async (name: string) => {
		const waits = examiner.waitForEvent('download');
		await examiner.getByRole('link', { name: `${name} (CSV)` }).click();
		const download: Download = await waits;
		const path = info.outputPath(download.suggestedFilename());
		await download.saveAs(path);
		return { path, name: download.suggestedFilename() };
	};
	const [trialsFile, sitesFile] = [await save('Trials'), await save('Sites')];
	expect([trialsFile.name, sitesFile.name]).toEqual([
		expect.stringContaining('trials.csv'),
		expect.stringContaining('sites.csv')
	]);
	const answer = await examiner.context().request.get(`${server.url}/api/cases/${code}/map`);
	const { sites } = (await answer.json()) as { sites: typeof RESULTS };
	const ofMap = sites.map(({ tag, task, language, disturbed, valid, excluded, verdict }) => ({
		tag,
		task,
		language,
		disturbed,
		valid,
		excluded,
		verdict
	}));
	expect(ofMap).toEqual(RESULTS);
	const rescored = await run('npm', ['run', '--silent', 'rescore', '--', trialsFile.path]);
	expect(rescored.stderr).toBe('');
	expect(readNumbers(rescored.stdout)).toEqual(ofMap);
	const exported = readNumbers(await readFile(sitesFile.path, 'utf8'));
	expect(exported.filter((row) => row.class === 'language')).toMatchObject(ofMap);

	const log = await logOf(examiner.context(), code);
	const audited = await run('npm', ['run', '--silent', 'audit'], {
		env: { ...process.env, DATA_DIR: server.dataDir }
	});
	expect(audited.stdout.trim()).toBe(`${code}  ${log.length} entries  check code ${log.at(-1)!.hash}`);
	for (const page of [administrator, examiner, surgeon, patient]) await page.context().close();
});

/** The rows of a CSV file, numbers as numbers. */
function readNumbers(text: string): Record<string, unknown>[] {
	const rows = parse(text, { columns: true, bom: true }) as Record<string, string>[];
	const counts = ['disturbed', 'valid', 'excluded'];
	return rows.map((row) =>
		Object.fromEntries(
			Object.entries(row).map(([name, value]) => [name, counts.includes(name) ? Number(value) : value])
		)
	);
}
