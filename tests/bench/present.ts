import type { Page } from '@playwright/test';
import type { DisplayCommand } from '../../src/lib/stimuli/display';
import { startBare, type BareServer } from './bare/start';
import { openClinic, type Clinic } from './clinic';
import type { Sample } from './distribution';
import type { Plan } from './plan';
import { PORTS } from './ports';
import { distributionColumns, distributionRow, heading, ratioRow, row } from './report';
import { takeStamps, told } from './stamps';
import { chooseTag, launch, openExaminer, openProfile, openWindow, pair, prepareCase, samplePicture } from './theatre';

const A_RUN = 100;
const WARM_UP = 5;
/** Time for a score to be saved and the item to go. */
const BETWEEN = 60;

type Way = 'channel' | 'server';

/** From the key that presents an item to the patient's screen, on the same computer and through the server alone. */
export async function present(plan: Plan): Promise<void> {
	const clinic = await openClinic();
	const bare = await startBare('push-server', PORTS.bare, { PICTURE: samplePicture() });
	try {
		report('channel', 'the other window of one browser', await measure('channel', clinic, bare, plan));
		report('server', 'another device, by the server alone', await measure('server', clinic, bare, plan));
	} finally {
		await bare.discard();
		await clinic.server.discard();
	}
}

/** Times of one presentation in milliseconds; from `key` on, `late` against the time it was planned for. */
interface Times {
	receipt: number;
	paint: number;
	late: number;
}

interface Measured {
	wordkeep: Times[][];
	bare: Times[][];
	missed: number;
}

async function measure(way: Way, clinic: Clinic, bare: BareServer, { runs, share }: Plan): Promise<Measured> {
	const measured: Measured = { wordkeep: [], bare: [], missed: 0 };
	const browser = await launch();
	try {
		const examining = await openProfile(browser, clinic, clinic.examiner);
		const watching = way === 'channel' ? examining : await openProfile(browser, clinic, null);
		const sender = await openWindow(examining);
		const hearer = await openWindow(watching);
		await sender.goto(`${bare.url}/sender#${way}`);
		await hearer.goto(`${bare.url}/hearer`);
		for (let run = 0; run < runs; run++) {
			const code = await prepareCase(clinic);
			const patient = await openWindow(watching);
			await pair(patient, clinic, code);
			const examiner = await openExaminer(examining, clinic, code);
			const samples = { wordkeep: [] as Times[], bare: [] as Times[] };
			for (let nth = -WARM_UP; nth < A_RUN * share; nth++) {
				const ours = await presentTrial(examiner, patient, nth + WARM_UP);
				const theirs = await presentBare(sender, hearer);
				if (nth < 0) continue;
				if (ours) samples.wordkeep.push(ours);
				else measured.missed++;
				samples.bare.push(theirs);
			}
			measured.wordkeep.push(samples.wordkeep);
			measured.bare.push(samples.bare);
			await Promise.all([patient.close(), examiner.close()]);
		}
	} finally {
		await browser.close();
	}
	return measured;
}

/** Presents one trial and scores it; null when the patient's page reported it missed. */
async function presentTrial(examiner: Page, patient: Page, nth: number): Promise<Times | null> {
	await chooseTag(examiner, nth);
	await takeStamps(examiner);
	await takeStamps(patient);
	const painted = told(patient, 'painted', 1500).catch(() => undefined);
	await examiner.keyboard.press('Space');
	await painted;
	const key = (await takeStamps(examiner)).keys.at(-1)!;
	const seen = await takeStamps(patient);
	await examiner.keyboard.press('Enter');
	await patient.waitForTimeout(BETWEEN);
	const shows = seen.received.flatMap(({ at, data }) => {
		const command = commandIn(data);
		return command?.kind === 'show' ? [{ at, ...command }] : [];
	});
	const [show] = shows;
	if (!show) throw new Error('the patient view heard of no presentation');
	const onset = seen.painted.find(({ name }) => name === show.trial);
	return onset ? { receipt: show.at - key, paint: onset.at - key, late: onset.at - show.showAt } : null;
}

/** The message as it came: an object from the other window, JSON from the server. */
function commandIn(data: unknown): DisplayCommand | null {
	if (typeof data === 'string') return JSON.parse(data) as DisplayCommand;
	return (data as { command?: DisplayCommand }).command ?? null;
}

async function presentBare(sender: Page, hearer: Page): Promise<Times> {
	const painted = told(hearer, 'painted');
	await sender.keyboard.press('Space');
	await painted;
	const key = (await takeStamps(sender)).keys.at(-1)!;
	const seen = await takeStamps(hearer);
	const receipt = seen.received[0]!.at;
	const paint = seen.painted[0]!.at;
	return { receipt: receipt - key, paint: paint - key, late: paint - receipt };
}

function report(way: Way, where: string, { wordkeep, bare, missed }: Measured): void {
	const of = (runs: Times[][], what: keyof Times): Sample[] => runs.map((run) => run.map((times) => times[what]));
	const control = way === 'channel' ? 'bare BroadcastChannel page' : 'bare page, POST and server-sent event';
	heading(`present: key to the patient view in ${where}, beside a ${control}`);
	distributionColumns('ms');
	distributionRow('receipt, Wordkeep (saved on the device first)', of(wordkeep, 'receipt'));
	distributionRow('receipt, bare', of(bare, 'receipt'));
	ratioRow('ratio', { wordkeep: of(wordkeep, 'receipt'), bare: of(bare, 'receipt') }, null);
	distributionRow('paint, Wordkeep (planned 100 ms ahead)', of(wordkeep, 'paint'));
	distributionRow('paint, bare (at once)', of(bare, 'paint'));
	ratioRow('ratio', { wordkeep: of(wordkeep, 'paint'), bare: of(bare, 'paint') }, null);
	distributionRow('paint after its planned time, Wordkeep', of(wordkeep, 'late'));
	distributionRow(
		'its distance from it',
		of(wordkeep, 'late').map((run) => run.map(Math.abs))
	);
	distributionRow('paint after receipt, bare', of(bare, 'late'));
	row('presentations reported missed, not shown late', String(missed));
}
