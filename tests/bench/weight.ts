import type { BrowserContext, Page } from '@playwright/test';
import { brotliCompressSync, gzipSync } from 'node:zlib';
import { startEmptyPage } from './bare/empty-page';
import { openClinic } from './clinic';
import { PORTS } from './ports';
import { columns, heading, row, target, times } from './report';
import { launch, openProfile, pair, prepareCase } from './theatre';

/** No script has come for so long: the page has all it needs to be used. */
const QUIET = 1500;
const MOST = { patient: 1.5, 'patient, with sounds': 1.5, examiner: 3 };

interface Weight {
	files: number;
	raw: number;
	gzip: number;
	brotli: number;
}

/** The scripts that each view loads before it can be used, beside those of an empty page of the same framework. */
export async function weight(): Promise<void> {
	const clinic = await openClinic();
	const empty = await startEmptyPage(PORTS.emptyPage);
	const browser = await launch();
	try {
		const code = await prepareCase(clinic);
		const withSounds = await prepareCase(clinic, ['objects-en', 'repetition-en']);
		const staff = await openProfile(browser, clinic, clinic.examiner);
		const { url } = clinic.server;
		const visit = (path: string) => (page: Page) => page.goto(url + path);
		const patient = await browser.newContext();
		const views: [name: string, profile: BrowserContext, open: (page: Page) => Promise<unknown>][] = [
			['sign-in', await browser.newContext(), visit('/sign-in')],
			['cases', staff, visit('/cases')],
			['case home', staff, visit(`/cases/${code}`)],
			['baseline', staff, visit(`/cases/${code}/baseline`)],
			['examiner', staff, visit(`/cases/${code}/examiner`)],
			['surgeon', staff, visit(`/cases/${code}/surgeon`)],
			['patient', patient, (page) => pair(page, clinic, code)],
			['patient, with sounds', await browser.newContext(), (page) => pair(page, clinic, withSounds)]
		];
		const floor = await weigh(await browser.newContext(), (page) => page.goto(empty.url));
		heading('weight: scripts that a view loads before it can be used, beside an empty page of the same framework');
		columns('files', 'raw kB', 'gzip kB', 'br kB', 'gzip', 'br');
		line('empty page', floor, floor);
		const weights = new Map<string, Weight>();
		for (const [name, profile, open] of views) {
			const found = await weigh(profile, open);
			weights.set(name, found);
			line(name, found, floor);
		}
		for (const [name, most] of Object.entries(MOST)) {
			const ratio = weights.get(name)!.gzip / floor.gzip;
			target(`${name} within ${most}x of the empty page, gzip: ${times(ratio)}`, ratio <= most);
		}
	} finally {
		await browser.close();
		await empty.discard();
		await clinic.server.discard();
	}
}

function line(name: string, { files, raw, gzip, brotli }: Weight, floor: Weight): void {
	const sizes = [raw, gzip, brotli].map((bytes) => (bytes / 1000).toFixed(1));
	row(name, String(files), ...sizes, times(gzip / floor.gzip), times(brotli / floor.brotli));
}

/** Opens a page and weighs every script that comes over the network; each is compressed by itself, as it is sent. */
async function weigh(profile: BrowserContext, open: (page: Page) => Promise<unknown>): Promise<Weight> {
	const page = await profile.newPage();
	const scripts = new Map<string, Promise<Buffer>>();
	let last = performance.now();
	page.on('response', (response) => {
		if (!response.headers()['content-type']?.startsWith('text/javascript')) return;
		last = performance.now();
		scripts.set(response.url(), response.body());
	});
	await open(page);
	while (performance.now() - last < QUIET) await page.waitForTimeout(100);
	const bodies = await Promise.all(scripts.values());
	await page.close();
	const sum = (size: (body: Buffer) => number) => bodies.reduce((total, body) => total + size(body), 0);
	return {
		files: bodies.length,
		raw: sum((body) => body.length),
		gzip: sum((body) => gzipSync(body, { level: 9 }).length),
		brotli: sum((body) => brotliCompressSync(body).length)
	};
}
