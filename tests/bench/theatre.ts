import { chromium, type Browser, type BrowserContext, type Page } from '@playwright/test';
import { readFileSync } from 'node:fs';
import { made } from '../api/entries';
import type { Member } from '../api/server';
import { copyForCase, type Catalogue } from '../../src/lib/stimuli/catalogue';
import type { Clinic } from './clinic';
import { stampPages } from './stamps';

const MEDIA = '.media';
const TAGS = Array.from({ length: 24 }, (_, index) => String(index + 1));

export async function launch(): Promise<Browser> {
	return await chromium.launch({
		executablePath: process.env.CHROMIUM ?? '/usr/bin/chromium',
		args: ['--no-sandbox', '--autoplay-policy=no-user-gesture-required']
	});
}

function itemSet(id: string) {
	const { sets } = JSON.parse(readFileSync(`${MEDIA}/catalogue.json`, 'utf8')) as Catalogue;
	const found = sets.find((set) => set.id === id);
	if (!found) throw new Error(`no item set ${id}`);
	return found;
}

/** A picture as a patient sees it, for the bare page. */
export function samplePicture(): string {
	const prompt = itemSet('objects-en').items[0]!.prompts.find(({ kind }) => kind === 'picture');
	if (prompt?.kind !== 'picture') throw new Error('the first object has no picture');
	return `${MEDIA}/${prompt.files.at(-1)!.file}`;
}

/** A case ready for its first trial: 24 tags are laid, and it has item sets, the pictures of objects unless said. */
export async function prepareCase(clinic: Clinic, sets: string[] = ['objects-en']): Promise<string> {
	const code = await clinic.newCase();
	const events = [
		...sets.map((id) => made('items-copied', copyForCase(itemSet(id)))),
		...TAGS.map((tag) => made('tag-placed', { tag }))
	];
	const answer = await clinic.examiner.client.post(`/api/cases/${code}/events`, { events });
	if (answer.status !== 200) throw new Error(`preparing the case was answered with ${answer.status}: ${answer.text}`);
	return code;
}

/** A browser profile of its own, signed in as somebody or as nobody, whose pages keep stamps. */
export async function openProfile(browser: Browser, clinic: Clinic, member: Member | null): Promise<BrowserContext> {
	const context = await browser.newContext({ viewport: { width: 1280, height: 800 } });
	const cookies = [...(member?.client.cookies ?? [])].map(([name, value]) => ({ name, value, url: clinic.server.url }));
	await context.addCookies(cookies);
	await stampPages(context);
	return context;
}

/**
 * A window of its own, as the two screens of one computer have: a page in a tab behind another one is not painted.
 */
export async function openWindow(profile: BrowserContext): Promise<Page> {
	const [first] = profile.pages();
	const opener = first ?? (await profile.newPage());
	const opened = profile.waitForEvent('page');
	await opener.evaluate(() => void open('about:blank', '', 'popup,width=1280,height=800'));
	return await opened;
}

/** Makes a page the patient view of a case, and waits until it has every picture. */
export async function pair(page: Page, clinic: Clinic, code: string): Promise<void> {
	const path = `/api/cases/${code}/patient-view`;
	const { client } = clinic.examiner;
	const offer = (await client.post(path)).body as { id: string; code: string };
	await page.goto(`${clinic.server.url}/patient#${offer.code}`);
	while ((await client.json('PUT', path, { id: offer.id })).status !== 200) await page.waitForTimeout(100);
	await page.getByTestId('stage').waitFor();
	await page.waitForFunction(() => /(\d+) of \1\b/.test(document.body.innerText), undefined, { timeout: 120_000 });
}

/** The examiner's page of a case, ready to present. */
export async function openExaminer(profile: BrowserContext, clinic: Clinic, code: string): Promise<Page> {
	const page = await openWindow(profile);
	await page.goto(`${clinic.server.url}/cases/${code}/examiner`);
	await page.locator('main').waitFor();
	return page;
}

/** The surgeon's screen of a case, its grid drawn. */
export async function openSurgeon(profile: BrowserContext, clinic: Clinic, code: string): Promise<Page> {
	const page = await openWindow(profile);
	await page.goto(`${clinic.server.url}/cases/${code}/surgeon`);
	await page.locator('main svg[role=img]').first().waitFor();
	return page;
}

/** Types a tag, the nth of those that are laid, round and round. */
export async function chooseTag(examiner: Page, nth: number): Promise<void> {
	for (const digit of TAGS[nth % TAGS.length]!) await examiner.keyboard.press(`Digit${digit}`);
}
