import { expect, test } from '@playwright/test';
import { readFileSync } from 'node:fs';
import type { LogEvent } from '../../src/lib/mapping/events';
import { openClinic, TheatreCase, wordItems, type Clinic } from './steps/clinic';
import { Desk } from './steps/desk';
import { KillableBrowser } from './steps/killable-browser';
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

const prepare = () => TheatreCase.prepare(clinic, { tags: ['1', '2', '7', '12'], sets: [OBJECTS] });

/** Tag and score of every trial of the log, in the order they were noted. */
function told(log: LogEvent[]): string[] {
	const tags = new Map<string, string | null>();
	return log.flatMap(({ type, data }) => {
		if (type === 'trial-presented') {
			const { trial, tag } = data as { trial: string; tag: string | null };
			tags.set(trial, tag);
			return [`show ${tag}`];
		}
		if (type !== 'trial-scored') return [];
		const { trial, score } = data as { trial: string; score: string };
		return [`${tags.get(trial)} ${score}`];
	});
}

test('a run goes on without the network, and a killed browser loses and doubles nothing', async () => {
	const found = await prepare();
	const browser = new KillableBrowser();
	const context = await browser.open();
	const desk = await Desk.open(context, clinic.examiner, found);
	const screen = await PatientScreen.pair(context, desk);
	await screen.trial(desk, '1', 'Enter');
	await desk.allSaved();
	await expect.poll(async () => (await found.entries('trial-onset')).length).toBe(1);

	await context.setOffline(true);
	let waiting = 0;
	for (const [tag, key] of [
		['2', 'n'],
		['7', 'Enter'],
		['12', 's']
	] as const) {
		await screen.trial(desk, tag, key);
		waiting += 2;
		await expect(desk.status.getByText(`${waiting} waiting to be sent`)).toBeVisible();
	}
	await expect(desk.status.getByText('server not reached: saved here, sent later')).toBeVisible();
	await expect(desk.status.getByText('saved here', { exact: true })).toBeVisible();
	await expect(desk.patientStatus).toContainText('on screen');
	await expect(desk.page.getByText(/Was it shown\?/)).toHaveCount(0);
	await expect(desk.tagButton('12')).toHaveAccessibleName('tag 12, open, 1 of 1 disturbed');
	await desk.press('Backspace');
	// Before that is done no trial is named large either.
	await desk.isNow('12');
	await desk.score('p');
	expect(told(await found.log())).toEqual(['show 1', '1 intact']);

	// Chromium writes its cookies to the disk every half minute; a clinic's are older than that.
	const cookies = await context.cookies();
	await browser.kill();
	const reopened = await browser.open();
	await reopened.addCookies(cookies);
	const again = await Desk.open(reopened, clinic.examiner, found);
	await again.allSaved();
	const whole = [
		'show 1',
		'1 intact',
		'show 2',
		'2 anomia',
		'show 7',
		'7 intact',
		'show 12',
		'12 semantic-paraphasia',
		'12 phonemic-paraphasia'
	];
	expect(told(await found.log())).toEqual(whole);
	expect(await found.entries('entry-withdrawn')).toHaveLength(1);
	expect((await found.map()).sites).toMatchObject([
		{ tag: '1', disturbed: 0, valid: 1 },
		{ tag: '2', disturbed: 1, valid: 1 },
		{ tag: '7', disturbed: 0, valid: 1 },
		{ tag: '12', disturbed: 1, valid: 1, kinds: { 'phonemic-paraphasia': 1 } }
	]);

	// The patient's window had its own entries to send.
	await (await reopened.newPage()).goto(`${clinic.server.url}/patient`);
	await expect.poll(async () => (await found.entries('trial-onset')).length).toBe(4);
	const ids = (await found.log()).map(({ id }) => id);
	expect(new Set(ids).size).toBe(ids.length);
	await browser.discard();
});

test('an answer that is lost after the server stored it stores once', async ({ context }) => {
	const found = await prepare();
	const desk = await Desk.open(context, clinic.examiner, found);
	let lost = 0;
	await desk.page.route(
		'**/events',
		async (route) => {
			lost++;
			expect((await route.fetch()).status()).toBe(200);
			await route.abort();
		},
		{ times: 2 }
	);
	await desk.trial('1', 'n');
	await desk.trial('2', 'Enter');
	await desk.allSaved();
	expect(lost).toBe(2);
	expect(told(await found.log())).toEqual(['show 1', '1 anomia', 'show 2', '2 intact']);
	expect(await found.entries('run-opened')).toHaveLength(1);
});

test('an entry that the server refuses is set aside in sight, and the others go on', async ({ context }) => {
	const found = await prepare();
	const desk = await Desk.open(context, clinic.examiner, found);
	// As the server does: one bad entry refuses its whole batch and is named. A cut network does not stop what a route
	// answers, so the route has to be cut as well.
	let isCut = false;
	await desk.page.route('**/events', async (route) => {
		if (isCut) return await route.abort('internetdisconnected');
		const { events } = route.request().postDataJSON() as { events: LogEvent[] };
		const index = events.findIndex(({ data }) => 'score' in data && data.score === 'perseveration');
		if (index < 0) return await route.continue();
		await route.fulfill({ status: 422, json: { error: 'score: not accepted here', index, id: events[index]!.id } });
	});
	await desk.trial('1', 'n');
	await desk.allSaved();
	isCut = true;
	await context.setOffline(true);
	await desk.trial('2', 'Enter');
	await desk.show('7');
	await desk.press('v');
	await expect(desk.lastTrials.first()).toContainText('perseveration');
	await desk.trial('12', 'n');
	isCut = false;
	await context.setOffline(false);
	await desk.allSaved();

	const aside = desk.status.getByRole('button', { name: '1 set aside: the server refused them' });
	await aside.click();
	const panel = desk.page.getByRole('region', { name: 'Set aside' });
	await expect(panel.getByRole('listitem')).toHaveText(/perseveration.*\(score: not accepted here\)/);
	const [download] = await Promise.all([
		desk.page.waitForEvent('download'),
		panel.getByRole('link', { name: 'keep a copy' }).click()
	]);
	const kept = JSON.parse(readFileSync(await download.path(), 'utf8')) as { reason: string; event: LogEvent }[];
	expect(kept).toMatchObject([{ reason: 'score: not accepted here', event: { data: { score: 'perseveration' } } }]);

	expect(told(await found.log())).toEqual([
		'show 1',
		'1 anomia',
		'show 2',
		'2 intact',
		'show 7',
		'show 12',
		'12 anomia'
	]);
	await expect(desk.tagButton('7')).toHaveAccessibleName('tag 7, untested');
	await expect(desk.lastTrials.filter({ hasText: 'waits for its score' })).toHaveCount(1);
	await desk.reload();
	await expect(aside).toBeVisible();
	await expect(desk.tagButton('7')).toHaveAccessibleName('tag 7, untested');
});

test('an answer that makes no sense or never comes is asked for again', async ({ context }) => {
	const found = await prepare();
	const desk = await Desk.open(context, clinic.examiner, found);
	await desk.show('1');
	await desk.allSaved();
	// Nothing is noted after it that would have it sent again.
	await desk.page.route(
		'**/events',
		(route) =>
			route.fulfill({ status: 422, contentType: 'text/html', body: '<h1>A page of the hospital’s network</h1>' }),
		{ times: 1 }
	);
	await desk.score('n');
	await desk.allSaved();
	await desk.page.route('**/events', () => undefined, { times: 1 });
	await desk.trial('2', 'Enter');
	await expect(desk.status.getByText(/waiting to be sent/)).toBeVisible();
	await expect(desk.status.getByText(/saved on the server/)).toBeVisible({ timeout: 20_000 });
	expect(told(await found.log())).toEqual(['show 1', '1 anomia', 'show 2', '2 intact']);
});
