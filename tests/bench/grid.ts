import type { BrowserContext, Page } from '@playwright/test';
import { startBare } from './bare/start';
import { openClinic, type Clinic } from './clinic';
import type { Sample } from './distribution';
import type { Plan } from './plan';
import { PORTS } from './ports';
import { distributionColumns, distributionRow, heading, ratioRow } from './report';
import { takeStamps, told } from './stamps';
import {
	chooseTag,
	launch,
	openExaminer,
	openProfile,
	openSurgeon,
	openWindow,
	prepareCase,
	samplePicture
} from './theatre';

const A_RUN = 100;
const WARM_UP = 5;
const MOST = 2;

/** From the key that scores a trial to the change of its ring on the surgeon's screen, in another profile. */
export async function grid({ runs, share }: Plan): Promise<void> {
	const clinic = await openClinic();
	const bare = await startBare('push-server', PORTS.bare, { PICTURE: samplePicture() });
	const browser = await launch();
	const measured = { wordkeep: [] as Times[][], bare: [] as Times[][] };
	try {
		const examining = await openProfile(browser, clinic, clinic.examiner);
		const operating = await openProfile(browser, clinic, clinic.surgeon);
		const sender = await openWindow(examining);
		const hearer = await openWindow(operating);
		await sender.goto(`${bare.url}/sender#server`);
		await hearer.goto(`${bare.url}/hearer`);
		for (let run = 0; run < runs; run++) {
			const pages = await openCase(clinic, examining, operating);
			const samples = { wordkeep: [] as Times[], bare: [] as Times[] };
			for (let nth = -WARM_UP; nth < A_RUN * share; nth++) {
				await present(pages, nth + WARM_UP);
				const ours = await pressToName(pages.examiner, pages.surgeon);
				const theirs = await pressToName(sender, hearer);
				if (nth < 0) continue;
				samples.wordkeep.push(ours);
				samples.bare.push(theirs);
			}
			measured.wordkeep.push(samples.wordkeep);
			measured.bare.push(samples.bare);
			await Promise.all([pages.examiner.close(), pages.surgeon.close()]);
		}
	} finally {
		await browser.close();
		await bare.discard();
		await clinic.server.discard();
	}

	heading(
		"grid: key that scores to the ring on the surgeon's screen, beside a bare page: POST, server-sent event, DOM"
	);
	const of = (runs: Times[][], what: keyof Times): Sample[] => runs.map((run) => run.map((times) => times[what]));
	const { wordkeep, bare: control } = measured;
	distributionColumns('ms');
	distributionRow('Wordkeep, saved on both sides on the way', of(wordkeep, 'whole'));
	distributionRow('bare page, nothing saved', of(control, 'whole'));
	ratioRow('ratio', { wordkeep: of(wordkeep, 'whole'), bare: of(control, 'whole') }, MOST);
	distributionRow('  of which key to message, Wordkeep', of(wordkeep, 'receipt'));
	distributionRow('  of which key to message, bare', of(control, 'receipt'));
	distributionRow('  of which message to DOM, Wordkeep', of(wordkeep, 'drawing'));
	distributionRow('  of which message to DOM, bare', of(control, 'drawing'));
}

/** Milliseconds from the key to the changed name, and its two parts: before and after the message came in. */
interface Times {
	whole: number;
	receipt: number;
	drawing: number;
}

interface Pages {
	examiner: Page;
	surgeon: Page;
}

/** Every run has a case of its own: a ring has one arc for each of its trials, and a real one has few. */
async function openCase(clinic: Clinic, examining: BrowserContext, operating: BrowserContext): Promise<Pages> {
	const code = await prepareCase(clinic);
	return {
		examiner: await openExaminer(examining, clinic, code),
		surgeon: await openSurgeon(operating, clinic, code)
	};
}

/** Starts the next trial and waits until the surgeon's page has heard of it. */
async function present({ examiner, surgeon }: Pages, nth: number): Promise<void> {
	await chooseTag(examiner, nth);
	await examiner.keyboard.press('Space');
	const heard = async () => (await takeStamps(surgeon)).received.some(({ data }) => isPresented(data));
	for (let tries = 0; !(await heard()); tries++) {
		if (tries > 200) throw new Error('the trial did not reach the surgeon');
		await surgeon.waitForTimeout(20);
	}
	await surgeon.waitForTimeout(50);
	await takeStamps(examiner);
	await takeStamps(surgeon);
}

function isPresented(data: unknown): boolean {
	return typeof data === 'string' && data.includes('"type":"trial-presented"');
}

/** Presses Enter on one page and waits until a name changes on another. */
async function pressToName(from: Page, to: Page): Promise<Times> {
	const renamed = told(to, 'renamed');
	await from.keyboard.press('Enter');
	await renamed;
	const key = (await takeStamps(from)).keys.at(-1)!;
	const { renamed: changes, received } = await takeStamps(to);
	const whole = changes[0]! - key;
	const receipt = received[0]!.at - key;
	return { whole, receipt, drawing: whole - receipt };
}
