import { expect, test } from '@playwright/test';
import { execFileSync } from 'node:child_process';
import { startServer } from '../api/server';
import { openClinic, TheatreCase, wordItems, type Clinic } from './steps/clinic';
import { Desk } from './steps/desk';
import { PatientScreen } from './steps/patient-screen';
import { SurgeonScreen } from './steps/surgeon-screen';

let clinic: Clinic;

test.beforeEach(async () => {
	clinic = await openClinic();
});

test.afterEach(async () => {
	await clinic.server.discard();
});

async function startAgain(): Promise<void> {
	const { dataDir, port } = clinic.server;
	clinic.server = await startServer({ dataDir, port });
}

/** Verifies the case logs on the disk as the command does; throws when it finds damage. */
function audit(): string {
	const env = { ...process.env, DATA_DIR: clinic.server.dataDir };
	return execFileSync('npm', ['run', '--silent', 'audit'], { env, encoding: 'utf8' });
}

test('a server killed in mid-run loses nothing it acknowledged, and every page comes back by itself', async ({
	context,
	browser
}) => {
	test.setTimeout(120_000);
	const objects = {
		task: 'object-naming',
		language: 'en',
		items: wordItems(['cat', 'drum', 'fork', 'lamp', 'pear', 'sock'])
	};
	const found = await TheatreCase.prepare(clinic, { tags: ['1', '2', '7'], sets: [objects] });
	const desk = await Desk.open(context, clinic.examiner, found);
	const screen = await PatientScreen.pair(context, desk);
	const wide = await browser.newContext({ viewport: { width: 1920, height: 1080 } });
	const surgeon = await SurgeonScreen.open(wide, clinic.surgeon, found);

	const acknowledged = new Set<string>();
	context.on('response', (response) => {
		if (!response.url().endsWith('/events') || response.status() !== 200) return;
		void response.json().then(
			({ stored }: { stored: { id: string }[] }) => stored.forEach(({ id }) => acknowledged.add(id)),
			() => undefined
		);
	});

	const keys = ['n', 'Enter', 's'];
	for (const key of keys) {
		await desk.show('1');
		await screen.shows(/^picture of/);
		// The score is on its way when the server dies.
		await desk.press(key);
		await clinic.server.kill();
		await desk.isFree();
		await screen.trial(desk, '2', key);
		await expect(desk.status.getByText('server not reached: saved here, sent later')).toBeVisible();
		await startAgain();
		await screen.trial(desk, '7', key);
		await desk.allSaved();
		const stored = new Set((await found.log()).map(({ id }) => id));
		expect([...acknowledged].filter((id) => !stored.has(id))).toEqual([]);
	}
	// Entries of a run, nine trials with their scores, and what the patient view said of them.
	expect(acknowledged.size).toBeGreaterThanOrEqual(1 + 9 + 9);

	expect((await found.presented()).map(({ tag }) => tag)).toEqual(['1', '2', '7', '1', '2', '7', '1', '2', '7']);
	expect((await found.entries('trial-scored')).map(({ score }) => score)).toEqual(
		['anomia', 'intact', 'semantic-paraphasia'].flatMap((score) => [score, score, score])
	);
	await surgeon.shows(['1', '2', '7'].map((tag) => [`tag ${tag}, positive, 2 of 3 disturbed`]));
	await expect(surgeon.page.getByText(/Not up to date/)).toHaveCount(0);
	await expect(desk.patientStatus).toContainText('on screen');
	await expect.poll(async () => (await found.entries('trial-onset')).length).toBe(9);
	expect((await found.entries('trial-onset')).every(({ shown }) => shown)).toBe(true);

	expect(audit()).toMatch(new RegExp(`^${found.code} {2}${(await found.log()).length} entries`, 'm'));
	await wide.close();
});
