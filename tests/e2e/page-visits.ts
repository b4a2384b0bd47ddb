import { expect, type Browser, type BrowserContext, type Page } from '@playwright/test';
import type { CaseItem } from '../../src/lib/mapping/events';
import { Client } from '../api/client';
import { startServer, type RoleName, type Server } from '../api/server';
import { PatientCase } from './patient-case';

const PASSWORD = 'a password for the demo';

/** The demo, with a browser for each of its people: a case prepared, one finished, one account a role. */
export class DemoClinic {
	#devices = new Map<RoleName, BrowserContext>();
	#clients = new Map<RoleName, Client>();
	#newcomers = 0;

	private constructor(
		readonly browser: Browser,
		readonly server: Server,
		/** an installation without any account */
		readonly unused: Server,
		readonly prepared: string,
		readonly finished: string
	) {}

	static async open(browser: Browser): Promise<DemoClinic> {
		const server = await startServer({ env: { WORDKEEP_DEMO: '1', DEMO_PASSWORD: PASSWORD } });
		const [, prepared, finished] = /Cases\s+(\S+) \(prepared\), (\S+) \(finished\)/.exec(server.printed.join('\n'))!;
		return new DemoClinic(browser, server, await startServer(), prepared!, finished!);
	}

	async close(): Promise<void> {
		for (const device of this.#devices.values()) await device.close();
		await this.server.discard();
		await this.unused.discard();
	}

	/** A new page of somebody; with null on a device that nobody has used. */
	async page(role: RoleName | null): Promise<Page> {
		if (role === null) {
			const unused = await this.browser.newContext({ baseURL: this.server.url });
			const page = await unused.newPage();
			page.once('close', () => void unused.close());
			return page;
		}
		let device = this.#devices.get(role);
		if (!device) {
			device = await this.browser.newContext({ baseURL: this.server.url });
			await device.request.post('/api/sign-in', { data: { email: emailOf(role), password: PASSWORD } });
			this.#devices.set(role, device);
		}
		return await device.newPage();
	}

	async client(role: RoleName): Promise<Client> {
		let client = this.#clients.get(role);
		if (!client) {
			client = new Client(this.server.url);
			await client.post('/api/sign-in', { email: emailOf(role), password: PASSWORD });
			this.#clients.set(role, client);
		}
		return client;
	}

	/** A case of the examiner's with three items. */
	async newCase(): Promise<PatientCase> {
		return await PatientCase.make(await this.client('examiner'), WORDS);
	}

	/** The one-time link of somebody who has not joined. */
	async invitation(): Promise<string> {
		const administrator = await this.client('administrator');
		const email = `newcomer-${++this.#newcomers}@demo.invalid`;
		const made = await administrator.post('/api/people', { name: 'Nora Newcomer', email, roles: ['reviewer'] });
		return made.body.link;
	}
}

const emailOf = (role: RoleName) => `${role}@demo.invalid`;
const WORDS: CaseItem[] = ['cat', 'drum', 'fork'].map((answer) => ({
	id: answer,
	answer,
	accepted: [`the ${answer}`],
	prompts: [{ kind: 'text', text: `picture of a ${answer}` }]
}));

/** One thing a page shows. */
export interface PageState {
	name: string;
	/** who sees it; null for somebody without an account */
	role: RoleName | null;
	show: (page: Page, clinic: DemoClinic) => Promise<unknown>;
	/** the server says no on the way, which a browser notes as an error */
	refused?: true;
}

export interface PageVisits {
	lighting: 'daylight' | 'theatre';
	/** the plain page first */
	states: PageState[];
}

const part = (name: string) => (page: Page, clinic: DemoClinic) => page.goto(`/cases/${clinic.finished}?part=${name}`);
const submit = (page: Page, name: string) => page.getByRole('button', { name, exact: true }).click();

async function offer(page: Page, clinic: DemoClinic): Promise<PatientCase> {
	const found = await clinic.newCase();
	const { code } = await found.offer();
	await page.goto(`/patient#${code}`);
	await expect(page.getByText(/^The examiner sees \d\d too$/)).toBeVisible();
	return found;
}

async function setUp(page: Page, clinic: DemoClinic): Promise<void> {
	const found = await offer(page, clinic);
	await found.confirm((await found.waiting())!.id);
	await expect(page.getByRole('heading', { name: 'Set up the screen' })).toBeVisible();
}

async function round(page: Page, clinic: DemoClinic): Promise<PatientCase> {
	const found = await clinic.newCase();
	await page.goto(`/cases/${found.code}/baseline`);
	await submit(page, 'Begin round 1');
	await expect(page.getByRole('heading', { name: 'Baseline, round 1' })).toBeVisible();
	return found;
}

async function desk(page: Page, clinic: DemoClinic, code = clinic.prepared): Promise<void> {
	await page.goto(`/cases/${code}/examiner`);
	await expect(page.getByText('saved here', { exact: true }).locator('circle[fill="currentColor"]')).toBeVisible();
}

async function trial(page: Page, clinic: DemoClinic): Promise<void> {
	await desk(page, clinic, (await clinic.newCase()).code);
	await page.keyboard.press('c');
	await expect(page.getByRole('main').getByText('now', { exact: true })).toBeVisible();
}

async function addSomebody(page: Page): Promise<void> {
	await page.goto('/people');
	await submit(page, 'Add somebody');
	await expect(page.getByRole('dialog')).toBeVisible();
}

/** Every page by its route, with what it shows to whom. */
export const VISITS: Record<string, PageVisits> = {
	'/(open)/sign-in': {
		lighting: 'daylight',
		states: [
			{ name: 'plain', role: null, show: (page) => page.goto('/sign-in') },
			{
				name: 'a wrong password',
				role: null,
				refused: true,
				show: async (page) => {
					await page.goto('/sign-in');
					await page.getByLabel('E-mail address').fill('nobody@demo.invalid');
					await submit(page, 'Sign in');
					await expect(page.getByRole('alert')).toBeVisible();
				}
			}
		]
	},
	'/(open)/invitation/[token]': {
		lighting: 'daylight',
		states: [
			{ name: 'plain', role: null, show: async (page, clinic) => page.goto(await clinic.invitation()) },
			{
				name: 'a short password',
				role: null,
				refused: true,
				show: async (page, clinic) => {
					await page.goto(await clinic.invitation());
					await page.getByLabel('New password').fill('short');
					await submit(page, 'Save and sign in');
					await expect(page.getByText('these are 5.')).toBeVisible();
				}
			},
			{ name: 'a link used before', role: null, refused: true, show: (page) => page.goto('/invitation/gone') }
		]
	},
	'/(open)/set-up/[token]': {
		lighting: 'daylight',
		states: [
			{ name: 'plain', role: null, show: (page, { unused }) => page.goto(unused.url + unused.setUp!) },
			{
				name: 'nothing filled in',
				role: null,
				refused: true,
				show: async (page, { unused }) => {
					await page.goto(unused.url + unused.setUp!);
					await submit(page, 'Make the account');
					await expect(page.getByText('these are 0.')).toBeVisible();
				}
			}
		]
	},
	'/(team)/account': {
		lighting: 'daylight',
		states: [
			{ name: 'plain', role: 'reviewer', show: (page) => page.goto('/account') },
			{
				name: 'nothing filled in',
				role: 'reviewer',
				refused: true,
				show: async (page) => {
					await page.goto('/account');
					await page.getByRole('textbox', { name: 'Name' }).fill(' ');
					await submit(page, 'Save name');
					await expect(page.getByText('Give a name of at most 100 characters.')).toBeVisible();
				}
			},
			{
				name: 'a wrong password',
				role: 'reviewer',
				refused: true,
				show: async (page) => {
					await page.goto('/account');
					await page.getByLabel('Password now').fill('wrong');
					await page.getByLabel('New password').fill('long enough to be taken');
					await submit(page, 'Change password');
					await expect(page.getByText('This is not your password.')).toBeVisible();
				}
			},
			{
				name: 'saved',
				role: 'reviewer',
				show: async (page) => {
					await page.goto('/account');
					await submit(page, 'Save name');
					await expect(page.getByText('Your name is saved.')).toBeVisible();
				}
			}
		]
	},
	'/(team)/cases': {
		lighting: 'daylight',
		states: [
			{ name: 'plain', role: 'therapist', show: (page) => page.goto('/cases') },
			{ name: 'of an administrator', role: 'administrator', show: (page) => page.goto('/cases') },
			{
				name: 'nothing found',
				role: 'therapist',
				show: async (page) => {
					await page.goto('/cases');
					await page.getByRole('searchbox').fill('nothing is called so');
					await expect(page.getByText('Nothing here contains')).toBeVisible();
				}
			}
		]
	},
	'/(team)/cases/new': {
		lighting: 'daylight',
		states: [
			{ name: 'plain', role: 'therapist', show: (page) => page.goto('/cases/new') },
			{
				name: 'nothing filled in',
				role: 'therapist',
				show: async (page) => {
					await page.goto('/cases/new');
					await expect(page.getByRole('group', { name: 'Team' }).getByRole('checkbox').first()).toBeVisible();
					await submit(page, 'Make the case');
					await expect(page.getByText('Choose the side.')).toBeVisible();
				}
			},
			{
				name: 'choosing languages',
				role: 'therapist',
				show: async (page) => {
					await page.goto('/cases/new');
					await page.getByLabel('Languages to be tested').fill('Fren');
					await page.getByRole('option', { name: 'French' }).first().click();
					await page.getByLabel('Languages to be tested').fill('German');
					await expect(page.getByRole('option').first()).toBeVisible();
				}
			}
		]
	},
	'/(team)/cases/[code]': {
		lighting: 'daylight',
		states: [
			...['overview', 'protocol', 'items', 'tags', 'results', 'details', 'log'].map((name) => ({
				name,
				role: 'therapist' as const,
				show: part(name)
			})),
			{
				name: 'an empty case',
				role: 'therapist',
				show: async (page, clinic) => {
					const made = await (
						await clinic.client('therapist')
					).post('/api/cases', { hemisphere: 'left', languages: ['fr'] });
					await page.goto(`/cases/${made.body.code}?part=items`);
				}
			},
			{
				name: 'a protocol that does not fit',
				role: 'therapist',
				show: async (page, clinic) => {
					await part('protocol')(page, clinic);
					for (const label of ['Valid trials a site needs', 'disturbed trials', 'Sent ahead, in milliseconds']) {
						await page.getByLabel(label).fill('none');
					}
					await submit(page, 'Save the protocol');
					await expect(page.getByText('A whole number from 1 to 20.')).toBeVisible();
				}
			},
			{
				name: 'tags that do not fit, and one laid before',
				role: 'therapist',
				show: async (page, clinic) => {
					await part('tags')(page, clinic);
					await page.getByLabel('Lay tags').fill('7');
					await submit(page, 'Lay');
					await expect(page.getByText('Tag 7 is laid already.')).toBeVisible();
					await page.getByLabel('Lay tags').fill('0');
					await submit(page, 'Lay');
					await expect(page.getByText(/^!?No tag: 0/)).toBeVisible();
				}
			},
			{
				name: 'a change that can be taken back',
				role: 'examiner',
				show: async (page, clinic) => {
					const found = await clinic.newCase();
					await page.goto(`/cases/${found.code}?part=tags`);
					await submit(page, 'Lay tag 1');
					await expect(page.getByText('Tag 1 laid')).toBeVisible();
				}
			},
			{ name: 'of a surgeon', role: 'surgeon', show: part('protocol') },
			{ name: 'of an administrator', role: 'administrator', show: part('overview') }
		]
	},
	'/(team)/cases/[code]/baseline': {
		lighting: 'daylight',
		states: [
			{ name: 'plain', role: 'therapist', show: (page, { prepared }) => page.goto(`/cases/${prepared}/baseline`) },
			{ name: 'a round', role: 'examiner', show: round },
			{
				name: 'pairing in a round',
				role: 'examiner',
				show: async (page, clinic) => {
					await round(page, clinic);
					await submit(page, 'Pair or set up');
					await submit(page, 'pair a patient view');
					await expect(page.getByRole('button', { name: 'open it in a second window' })).toBeVisible();
				}
			},
			{
				name: 'the record of a round',
				role: 'examiner',
				show: async (page, clinic) => {
					await round(page, clinic);
					await page.keyboard.press('n');
					await expect(page.getByText('the rule says drop')).toBeVisible();
					await submit(page, 'Follow the rule: drop 1');
					await expect(page.getByText('1 item decided by the rule')).toBeVisible();
				}
			}
		]
	},
	'/(team)/cases/[code]/examiner': {
		lighting: 'theatre',
		states: [
			{ name: 'plain', role: 'examiner', show: (page, clinic) => desk(page, clinic) },
			{
				name: 'pairing',
				role: 'examiner',
				show: async (page, clinic) => {
					await desk(page, clinic);
					await page.getByRole('button', { name: /^patient view/ }).click();
					await page.getByRole('button', { name: /^pair (a patient view|another)$/ }).click();
					await expect(page.getByRole('button', { name: 'open it in a second window' })).toBeVisible();
				}
			},
			{
				name: 'changing keys',
				role: 'examiner',
				show: async (page, clinic) => {
					await desk(page, clinic);
					await submit(page, 'keys');
					await expect(page.getByRole('heading', { name: 'Change keys' })).toBeVisible();
				}
			},
			{
				name: 'a trial that waits, what was said, the current',
				role: 'examiner',
				show: async (page, clinic) => {
					await trial(page, clinic);
					await page.keyboard.press(',');
					await expect(page.getByLabel('What the patient said')).toBeVisible();
					await page.keyboard.press('Escape');
					await page.keyboard.press('m');
					await page.getByLabel('Current in mA, zero to peak').fill('x');
				}
			},
			{
				name: 'an earlier trial',
				role: 'examiner',
				show: async (page, clinic) => {
					await trial(page, clinic);
					await page.keyboard.press('n');
					await expect(page.getByRole('main').getByText(/^next, /)).toBeVisible();
					await page.keyboard.press('ArrowUp');
					await expect(page.getByRole('group', { name: 'correct this trial' })).toBeVisible();
				}
			},
			{
				name: 'a seizure',
				role: 'examiner',
				show: async (page, clinic) => {
					await desk(page, clinic, (await clinic.newCase()).code);
					await page.keyboard.press('z');
					await expect(page.getByText('Seizure: trials do not count')).toBeVisible();
				}
			},
			{
				name: 'a whole mapping',
				role: 'examiner',
				show: (page, { finished }) => page.goto(`/cases/${finished}/examiner`)
			}
		]
	},
	'/(team)/cases/[code]/surgeon': {
		lighting: 'theatre',
		states: [
			{
				name: 'plain',
				role: 'surgeon',
				show: (page, { finished }) => page.goto(`/cases/${finished}/surgeon?distance=1000`)
			},
			{
				name: 'before use',
				role: 'surgeon',
				show: async (page, { prepared }) => {
					await page.goto(`/cases/${prepared}/surgeon`);
					await page.mouse.move(100, 100);
					await page.getByLabel('Read from, metres').focus();
				}
			}
		]
	},
	'/(team)/library': {
		lighting: 'daylight',
		states: [{ name: 'plain', role: 'surgeon', show: (page) => page.goto('/library') }]
	},
	'/(team)/library/[set]': {
		lighting: 'daylight',
		states: [
			{ name: 'pictures', role: 'surgeon', show: (page) => page.goto('/library/objects-en') },
			{ name: 'sounds', role: 'surgeon', show: (page) => page.goto('/library/repetition-en') },
			{ name: 'text', role: 'surgeon', show: (page) => page.goto('/library/completion-en') }
		]
	},
	'/(team)/people': {
		lighting: 'daylight',
		states: [
			{ name: 'plain', role: 'administrator', show: (page) => page.goto('/people') },
			{ name: 'adding', role: 'administrator', show: addSomebody },
			{
				name: 'adding with nothing filled in',
				role: 'administrator',
				refused: true,
				show: async (page) => {
					await addSomebody(page);
					await submit(page, 'Add and make a link');
					await expect(page.getByRole('dialog').locator('[aria-invalid]').first()).toBeVisible();
				}
			},
			{
				name: 'a one-time link',
				role: 'administrator',
				show: async (page) => {
					await addSomebody(page);
					await page.getByRole('textbox', { name: 'Name' }).fill('Lin Newcomer');
					await page.getByLabel('E-mail address').fill('lin@demo.invalid');
					await page.getByRole('checkbox', { name: /^surgeon/ }).check();
					await submit(page, 'Add and make a link');
					await expect(page.getByRole('heading', { name: 'One-time link' })).toBeVisible();
				}
			},
			{
				name: 'changing somebody',
				role: 'administrator',
				show: async (page) => {
					await page.goto('/people');
					await submit(page, 'Change Demo Surgeon');
					await expect(page.getByRole('dialog')).toBeVisible();
				}
			}
		]
	},
	'/patient': {
		lighting: 'daylight',
		states: [
			{
				name: 'plain',
				role: null,
				show: async (page) => {
					await page.goto('/patient');
					await expect(page.getByLabel('Code')).toBeVisible();
				}
			},
			{
				name: 'a code too short',
				role: null,
				show: async (page) => {
					await page.goto('/patient');
					await page.getByLabel('Code').fill('AB');
					await submit(page, 'Pair this screen');
					await expect(page.getByText('A code has eight letters and digits.')).toBeVisible();
				}
			},
			{ name: 'waiting for the examiner', role: null, show: offer },
			{ name: 'set-up, sound', role: null, show: setUp },
			{
				name: 'set-up, size',
				role: null,
				show: async (page, clinic) => {
					await setUp(page, clinic);
					await submit(page, 'Size');
				}
			},
			{
				name: 'set-up, measuring',
				role: null,
				show: async (page, clinic) => {
					await setUp(page, clinic);
					await submit(page, 'Size');
					await submit(page, 'Measure with a card');
					await expect(page.getByRole('heading', { name: 'Measure this screen' })).toBeVisible();
				}
			},
			{
				name: 'set-up, place',
				role: null,
				show: async (page, clinic) => {
					await setUp(page, clinic);
					await submit(page, 'Place');
				}
			},
			{
				name: 'between items',
				role: null,
				show: async (page, clinic) => {
					await setUp(page, clinic);
					await submit(page, 'Ready');
					await expect(page.getByRole('heading')).toHaveCount(0);
				}
			}
		]
	}
};
