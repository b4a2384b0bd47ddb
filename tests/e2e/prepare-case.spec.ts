/** A case is prepared by its pages alone, and the API sees what they did. */
import AxeBuilder from '@axe-core/playwright';
import { expect, test, type BrowserContext, type Page } from '@playwright/test';
import type { LogEvent } from '../../src/lib/mapping/events';
import { PASSWORD, startServer, team, type Member, type RoleName, type Server } from '../api/server';

let server: Server;
let members: Record<RoleName, Member>;

test.beforeAll(async () => {
	server = await startServer();
	members = await team(server);
});

test.afterAll(async () => {
	await server.discard();
});

test.beforeEach(async ({ context }) => {
	await signIn(context, 'therapist');
});

async function signIn(context: BrowserContext, role: RoleName): Promise<void> {
	const answer = await context.request.post(`${server.url}/api/sign-in`, {
		data: { email: members[role].email, password: PASSWORD }
	});
	expect(answer.status()).toBe(200);
}

/** A case as the API makes it, for what is not about making one. */
async function newCase(languages = ['en']): Promise<string> {
	const made = await members.therapist.client.post('/api/cases', { hemisphere: 'left', languages });
	expect(made.status).toBe(201);
	return made.body.code;
}

async function logOf(code: string): Promise<LogEvent[]> {
	return (await members.therapist.client.get(`/api/cases/${code}/events`)).body.events;
}

async function tagsOf(code: string): Promise<string[]> {
	const map = await members.therapist.client.get(`/api/cases/${code}/map`);
	return map.body.tags.map(({ tag }: { tag: string }) => tag);
}

async function openPart(page: Page, part: string): Promise<void> {
	await page.getByRole('navigation', { name: 'Parts of the case' }).getByRole('link', { name: part }).click();
}

const isSaved = (page: Page) => expect(page.getByText('saved on the server', { exact: true })).toBeVisible();

test('a new case, its protocol, two item sets and six tags', async ({ page }) => {
	await page.goto(`${server.url}/cases`);
	await expect(page.getByText('There is no case yet')).toBeVisible();
	await page.getByRole('link', { name: 'New case' }).first().click();

	// What is missing is named, and what was typed stays.
	await page.getByLabel('Note').fill('Second operation on this side.');
	await page.getByRole('button', { name: 'Make the case' }).click();
	await expect(page.getByText('Choose the side.')).toBeVisible();
	await expect(page.getByText('Choose at least one language.')).toBeVisible();
	await expect(page.getByLabel('Note')).toHaveValue('Second operation on this side.');

	await page.getByLabel('left hemisphere').check();
	for (const language of ['English', 'Austrian German']) {
		await page.getByLabel('Languages to be tested').fill(language);
		await page.getByRole('option', { name: language }).first().click();
	}
	await page.getByLabel('Planned date').fill('2027-02-03');
	await page.getByRole('group', { name: 'Team' }).getByLabel('surgeon').check();
	await page.getByRole('button', { name: 'Make the case' }).click();
	await page.waitForURL(/\/cases\/[a-z]{4}-[a-z]{4}-\d\d$/);
	const code = page.url().split('/').at(-1)!;

	const made = await members.therapist.client.get(`/api/cases/${code}`);
	expect(made.body).toMatchObject({
		hemisphere: 'left',
		languages: ['en', 'de-AT'],
		plannedOn: '2027-02-03',
		note: 'Second operation on this side.'
	});
	expect(made.body.team.map(({ id }: { id: string }) => id).sort()).toEqual(
		[members.therapist.id, members.surgeon.id].sort()
	);

	// Protocol: a number that does not fit is named and kept; then one entry with the changed fields alone.
	await openPart(page, 'Protocol');
	const needed = page.getByLabel('Valid trials a site needs');
	await needed.fill('0');
	await page.getByRole('button', { name: 'Save the protocol' }).click();
	await expect(page.getByText('A whole number from 1 to 20.')).toBeVisible();
	await expect(needed).toHaveValue('0');
	await needed.fill('4');
	await page.getByLabel('dysarthria has a key of its own').uncheck();
	await page.getByLabel('Effect of delay for language').selectOption({ label: 'disturbed' });
	await page.getByRole('button', { name: 'Save the protocol' }).click();
	await expect(page.getByText('Protocol changed')).toBeVisible();
	await isSaved(page);
	const protocols = (await logOf(code)).filter(({ type }) => type === 'protocol-set');
	expect(protocols.map(({ data }) => Object.keys(data).sort())).toEqual([['effects', 'kinds', 'rule']]);
	expect(protocols[0]!.data).toMatchObject({
		rule: { minTrials: 4, share: [2, 3] },
		effects: { delay: { language: 'disturbed' } }
	});

	// Items: sets of the languages of the case are offered, and Austrian German can use German ones.
	await openPart(page, 'Items');
	for (const set of ['Objects, English', 'Gegenstände, Deutsch']) {
		await page.getByRole('button', { name: `Add ${set}` }).click();
		await expect(page.getByText(`items added from ${set}`)).toBeVisible();
	}
	await page.getByLabel('object naming, English is required').check();
	await expect
		.poll(async () => (await logOf(code)).at(-1))
		.toMatchObject({ type: 'protocol-set', data: { required: [{ task: 'object-naming', language: 'en' }] } });
	const log = await logOf(code);
	const library = await members.therapist.client.get('/api/library');
	const counts = new Map<string, number>(
		library.body.sets.map((set: { id: string; count: number }) => [set.id, set.count])
	);
	const copied = log.flatMap((event) => (event.type === 'items-copied' ? [event.data] : []));
	expect(copied.map(({ set, items }) => [set, items.length])).toEqual([
		['objects-en', counts.get('objects-en')],
		['objects-de', counts.get('objects-de')]
	]);

	// Tags in a row; one is taken off and the change taken back; a number used again is offered as another site.
	await openPart(page, 'Tags');
	await page.getByLabel('Lay tags').fill('1 to 6');
	await page.getByRole('button', { name: 'Lay', exact: true }).click();
	await expect(page.getByText('6 tags laid')).toBeVisible();
	await expect.poll(() => tagsOf(code)).toEqual(['1', '2', '3', '4', '5', '6']);

	await page.getByRole('button', { name: 'Take tag 3 off' }).click();
	await expect(page.getByText('Tag 3 taken off')).toBeVisible();
	await expect.poll(() => tagsOf(code)).toEqual(['1', '2', '4', '5', '6']);
	await page.getByRole('button', { name: 'Take back' }).click();
	await expect(page.getByText('Taken back: Tag 3 taken off')).toBeVisible();
	await expect.poll(() => tagsOf(code)).toEqual(['1', '2', '3', '4', '5', '6']);
	await page.getByRole('button', { name: 'Put back' }).click();
	await expect(page.getByText('Tag 3 taken off', { exact: true })).toBeVisible();
	await expect.poll(() => tagsOf(code)).toEqual(['1', '2', '4', '5', '6']);

	await page.getByLabel('Lay tags').fill('6');
	await page.getByRole('button', { name: 'Lay', exact: true }).click();
	await page.getByRole('button', { name: 'Another spot: lay 6B' }).click();
	await expect.poll(() => tagsOf(code)).toEqual(['1', '2', '4', '5', '6', '6B']);

	// What was done stands in the case log, in words, with who did it.
	await openPart(page, 'Case log');
	await expect(page.getByRole('row', { name: /therapist Tag 6B laid/ })).toBeVisible();
	await expect(page.getByRole('row', { name: /Put back: Tag 3 taken off/ })).toBeVisible();
});

test('with the keyboard alone', async ({ page }) => {
	const tabTo = async (name: string | RegExp) => {
		for (let presses = 0; presses < 120; presses++) {
			await page.keyboard.press('Tab');
			const focused = page.locator(':focus');
			if ((await focused.count()) > 0 && (await focused.and(page.getByLabel(name)).count()) > 0) return;
			for (const role of ['link', 'button'] as const) {
				if ((await focused.and(page.getByRole(role, { name })).count()) > 0) return;
			}
		}
		throw new Error(`the keyboard does not reach ${String(name)}`);
	};

	await page.goto(`${server.url}/cases/new`);
	await expect(page.getByLabel('left hemisphere')).toBeVisible();
	await tabTo('left hemisphere');
	await page.keyboard.press('Space');
	await tabTo('Languages to be tested');
	await page.keyboard.type('fren');
	await page.keyboard.press('ArrowDown');
	await page.keyboard.press('ArrowUp');
	await page.keyboard.press('Enter');
	await tabTo('Make the case');
	await page.keyboard.press('Enter');
	await page.waitForURL(/\/cases\/[a-z]{4}-[a-z]{4}-\d\d$/);
	const code = page.url().split('/').at(-1)!;
	expect((await members.therapist.client.get(`/api/cases/${code}`)).body).toMatchObject({
		hemisphere: 'left',
		languages: ['fr']
	});

	await tabTo('Tags');
	await page.keyboard.press('Enter');
	await expect(page).toHaveURL(/part=tags$/);
	await tabTo('Lay tags');
	await page.keyboard.type('7, 8');
	await page.keyboard.press('Enter');
	await expect(page.getByText('2 tags laid')).toBeVisible();
	await tabTo('Take back');
	await page.keyboard.press('Enter');
	await expect(page.getByText('Taken back: 2 tags laid')).toBeVisible();
	await expect.poll(() => tagsOf(code)).toEqual([]);
	expect((await logOf(code)).map(({ type }) => type)).toEqual([
		'tag-placed',
		'tag-placed',
		'entry-withdrawn',
		'entry-withdrawn'
	]);
});

test('without the server: saved here first, on the server when it is back', async ({ page, context }) => {
	const code = await newCase();
	await page.goto(`${server.url}/cases/${code}?part=tags`);
	await isSaved(page);
	await context.setOffline(true);
	await page.getByLabel('Lay tags').fill('5');
	await page.getByRole('button', { name: 'Lay', exact: true }).click();
	await expect(page.getByText('1 entry saved here, waiting to be sent')).toBeVisible();
	expect(await tagsOf(code)).toEqual([]);
	await context.setOffline(false);
	await expect.poll(() => tagsOf(code)).toEqual(['5']);
});

test('details: changed, taken back; nothing sent that is not complete', async ({ page }) => {
	const code = await newCase(['en', 'de']);
	await page.goto(`${server.url}/cases/${code}?part=details`);
	await page.getByLabel('right hemisphere').check();
	await page.getByRole('button', { name: 'Remove German' }).click();
	await page.getByRole('button', { name: 'Save the details' }).click();
	await expect(page.getByText('Details changed')).toBeVisible();
	const read = async () => (await members.therapist.client.get(`/api/cases/${code}`)).body;
	expect(await read()).toMatchObject({ hemisphere: 'right', languages: ['en'] });
	await page.getByRole('button', { name: 'Take back' }).click();
	await expect(page.getByText('Taken back: Details changed')).toBeVisible();
	expect(await read()).toMatchObject({ hemisphere: 'left', languages: ['en', 'de'] });

	await page.getByRole('button', { name: 'Remove German' }).click();
	await page.getByRole('button', { name: 'Remove English' }).click();
	await page.getByRole('button', { name: 'Save the details' }).click();
	await expect(page.getByText('Choose at least one language.')).toBeVisible();
	expect(await read()).toMatchObject({ languages: ['en', 'de'] });
});

test('an administrator sets the team and sees nothing else', async ({ page, context }) => {
	const code = await newCase();
	await signIn(context, 'administrator');
	await page.goto(`${server.url}/cases`);
	await page.getByRole('link', { name: code }).click();
	await expect(page.getByText('You see who is on this case, not what is in it.')).toBeVisible();
	await expect(page.getByText('left hemisphere')).toHaveCount(0);
	await page.getByRole('group', { name: 'Team' }).getByLabel('examiner').check();
	await page.getByRole('button', { name: 'Save the team' }).click();
	await expect(page.getByText('Team changed')).toBeVisible();
	const ids = async () =>
		(await members.administrator.client.get(`/api/cases/${code}`)).body.team.map(({ id }: { id: string }) => id);
	expect((await ids()).sort()).toEqual([members.therapist.id, members.examiner.id].sort());
	await page.getByRole('button', { name: 'Take back' }).click();
	await expect.poll(ids).toEqual([members.therapist.id]);
});

test('a surgeon reads and changes nothing', async ({ page, context }) => {
	const code = await newCase();
	const people = [members.therapist.id, members.surgeon.id];
	await members.administrator.client.json('PUT', `/api/cases/${code}/team`, { team: people });
	await signIn(context, 'surgeon');
	await page.goto(`${server.url}/cases/${code}?part=tags`);
	await expect(page.getByText('No tag is laid yet')).toBeVisible();
	await expect(page.getByText('reading only')).toBeVisible();
	await expect(page.getByLabel('Lay tags')).toHaveCount(0);
	await expect(page.getByRole('link', { name: 'Examiner view' })).toHaveCount(0);
	await openPart(page, 'Protocol');
	await expect(page.getByLabel('Valid trials a site needs')).toBeDisabled();
});

test('a baseline round by hand: each item by one key, the rule proposes, the therapist decides', async ({ page }) => {
	const code = await newCase();
	await page.goto(`${server.url}/cases/${code}?part=items`);
	await page.getByRole('button', { name: 'Add Objects, English' }).click();
	await page.getByRole('link', { name: 'Try them in a baseline round' }).click();
	await page.getByRole('button', { name: 'Begin round 1' }).click();
	const item = page.getByRole('region', { name: 'Baseline, round 1' }).getByRole('heading', { level: 2 });
	const next = async (key: string) => {
		const before = await item.textContent();
		await page.keyboard.press(key);
		await expect(item).not.toHaveText(before!);
		return before!;
	};
	const first = await next('Enter');
	const second = await next('n');
	await page.keyboard.press(',');
	await page.keyboard.type('a thing');
	await page.keyboard.press('Enter');
	const third = await next('s');
	await page.keyboard.press('Backspace');
	await expect(item).toHaveText(third);
	await next('Enter');
	await page.getByRole('button', { name: 'End round 1' }).click();

	const row = (name: string) => page.getByRole('row', { name: new RegExp(`^${name} `) });
	await expect(row(first)).toContainText('right');
	await expect(row(second)).toContainText('the rule says drop');
	// One error in three answers; the interval by the formula of Wilson (1927): 6.1 % to 79.2 %.
	await expect(page.getByText('errors (95 % interval 6.1 % to 79.2 %)')).toBeVisible();
	await page.getByRole('button', { name: 'Follow the rule: drop 1' }).click();
	await expect(row(second)).toContainText('dropped');
	await page.getByRole('button', { name: `Drop ${third}` }).click();
	await expect(row(third)).toContainText('the rule says keep');
	await expect(page.getByRole('button', { name: /Follow the rule/ })).toHaveCount(0);
	await page.getByRole('button', { name: 'Take back' }).click();
	await expect.poll(async () => (await logOf(code)).at(-1)?.type).toBe('entry-withdrawn');

	const log = await logOf(code);
	const ofType = (type: LogEvent['type']) => log.filter((event) => event.type === type);
	expect(ofType('trial-presented').map(({ data }) => data)).toEqual(
		Array.from({ length: 3 }, () => expect.objectContaining({ stimulated: false, tag: null, task: 'object-naming' }))
	);
	expect(ofType('trial-scored').map(({ data }) => ('score' in data ? [data.score, data.said] : []))).toEqual([
		['intact', undefined],
		['anomia', undefined],
		['semantic-paraphasia', 'a thing'],
		['intact', undefined]
	]);
	expect(ofType('item-decided').map(({ data }) => 'keep' in data && data.reason)).toEqual([
		'baseline',
		'decided by hand'
	]);
	expect(log.at(-1)).toMatchObject({ type: 'entry-withdrawn', data: { entry: ofType('item-decided')[1]!.id } });
});

/** Narrower ones, and every state of a page: accessibility.spec.ts. */
const SIZES = [{ width: 1920, height: 1080 }];

for (const size of SIZES) {
	test(`every page is accessible and fits ${size.width} x ${size.height}`, async ({ page }) => {
		const code = await newCase(['en', 'de']);
		await page.setViewportSize(size);
		const parts = ['overview', 'protocol', 'items', 'tags', 'results', 'details', 'log'];
		const addresses = [
			'/cases',
			'/cases/new',
			...parts.map((part) => `/cases/${code}?part=${part}`),
			`/cases/${code}/baseline`,
			'/library',
			'/library/objects-en',
			'/library/repetition-en'
		];
		for (const address of addresses) {
			await page.goto(server.url + address);
			await expect(page.getByRole('heading', { level: 1 })).toBeVisible();
			await expect(page.getByText(/^Reading the .* \.\.\.$/)).toHaveCount(0);
			const wider = await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth);
			expect(wider, `${address} is wider than the window`).toBeLessThanOrEqual(0);
			const { violations } = await new AxeBuilder({ page })
				.withTags(['wcag2a', 'wcag2aa', 'wcag21aa', 'wcag22aa'])
				.analyze();
			expect(violations.map(({ id, nodes }) => [address, id, nodes[0]?.html])).toEqual([]);
		}
	});
}
