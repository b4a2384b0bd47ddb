import { expect, test } from '@playwright/test';
import type { CatalogueItem } from '../../src/lib/stimuli/catalogue';
import type { Client } from '../api/client';
import { openClinic, TheatreCase, type Clinic } from './steps/clinic';
import { Desk } from './steps/desk';
import { PatientScreen } from './steps/patient-screen';
import { SurgeonScreen } from './steps/surgeon-screen';

let clinic: Clinic;

test.beforeAll(async () => {
	clinic = await openClinic();
});

test.afterAll(async () => {
	await clinic.server.discard();
});

/** The first pictures of a set of the library. */
async function pictures(client: Client, set: string, language: string) {
	const { items } = (await client.get(`/api/library/${set}`)).body as { items: CatalogueItem[] };
	return {
		task: 'object-naming',
		language,
		items: items.slice(0, 10).map(({ id, answer, accepted, prompts }) => ({ id, answer, accepted, prompts }))
	};
}

/**
 * What the trials below give, worked out by hand from the rule: at least 3 valid stimulated trials, and positive when
 * at least two thirds of them were disturbed.
 *
 *  1  English  anomia, intact, intact                                        1/3 < 2/3, negative
 *  2  English  speech arrest, anomia, intact (moved here from 3, scored anew) 2/3, positive
 *     German   intact, intact, intact                                        0/3, negative
 *  3  English  semantic, intact, phonemic, intact                            2/4 < 2/3, negative
 *  5  English  intact, (anomia: taken back with its trial), intact           0 of 2, open, cannot become positive
 *     German   anomia, semantic, anomia                                      3/3, positive
 *  7B English  intact, anomia (contested, settled), contested                1 of 2, open
 *  12 English  intact, (anomia: afterdischarge), intact, intact              0/3, one not counted, negative
 *  controls    intact, intact, anomia                                        1 of 3 errors without stimulation
 */
const row = (tag: string, language: string, verdict: string, disturbed: number, valid: number, rest: object) => ({
	tag,
	task: 'object-naming',
	language,
	verdict,
	disturbed,
	valid,
	excluded: 0,
	settled: null,
	remaining: 0,
	milliamps: [3, 3],
	...rest
});
const SITES = [
	row('1', 'en', 'negative', 1, 3, { kinds: { anomia: 1 } }),
	row('2', 'de', 'negative', 0, 3, { kinds: {}, milliamps: [3.5, 3.5] }),
	row('2', 'en', 'positive', 2, 3, { kinds: { 'speech-arrest': 1, anomia: 1 } }),
	row('3', 'en', 'negative', 2, 4, { kinds: { 'semantic-paraphasia': 1, 'phonemic-paraphasia': 1 } }),
	row('5', 'de', 'positive', 3, 3, { kinds: { anomia: 2, 'semantic-paraphasia': 1 }, milliamps: [3.5, 3.5] }),
	row('5', 'en', 'open', 0, 2, { kinds: {}, settled: 'negative', remaining: 1 }),
	row('7B', 'en', 'open', 1, 2, { kinds: { anomia: 1 }, remaining: 1 }),
	row('12', 'en', 'negative', 0, 3, { kinds: {}, excluded: 1 })
];
const tagResult = (tag: string, result: string, more: object = {}) => ({
	tag,
	kind: 'cortical',
	result,
	positive: result === 'positive' ? ['language'] : [],
	open: [],
	...more
});
const TAGS = [
	tagResult('1', 'negative'),
	tagResult('2', 'positive'),
	tagResult('3', 'negative'),
	tagResult('5', 'positive'),
	tagResult('7B', 'open', { open: [{ task: 'object-naming', language: 'en' }] }),
	tagResult('12', 'negative')
];
const bars = (english: string, german: string) => [
	`object naming, English, ${english}`,
	`object naming, German, ${german}`
];
const RINGS = [
	['tag 1, negative, 1 of 3 disturbed', ...bars('negative', 'untested')],
	['tag 2, positive, 2 of 3 disturbed', ...bars('positive', 'negative')],
	['tag 3, negative, 2 of 4 disturbed', ...bars('negative', 'untested')],
	['tag 5, positive, 3 of 3 disturbed', ...bars('open', 'positive')],
	['tag 7B, open, 1 of 2 disturbed', ...bars('open', 'untested')],
	['tag 12, negative, 0 of 3 disturbed, 1 not counted', ...bars('negative', 'untested')]
];

test('a whole mapping on three devices gives the table worked out by hand', async ({ browser }) => {
	test.setTimeout(180_000);
	const { client } = clinic.examiner;
	const found = await TheatreCase.prepare(clinic, {
		tags: ['1', '2', '3', '5', '7B', '12'],
		sets: [await pictures(client, 'objects-en', 'en'), await pictures(client, 'objects-de', 'de')]
	});
	const desk = await Desk.open(await browser.newContext(), clinic.examiner, found);
	const wide = await browser.newContext({ viewport: { width: 1920, height: 1080 } });
	const surgeon = await SurgeonScreen.open(wide, clinic.surgeon, found);
	const patient = await PatientScreen.pair(await browser.newContext(), desk);

	const trial = (tag: string | null, key: string) => patient.trial(desk, tag, key);
	const ring = (name: string) => expect(surgeon.grid.getByRole('img', { name, exact: true })).toBeVisible();
	/** Somebody else scores the last trial at the same time, without knowing of the first score. */
	const alsoScored = async (score: 'intact' | 'anomia') => {
		await desk.allSaved();
		const last = (await found.presented()).at(-1)!;
		await found.note(['trial-scored', { trial: last.trial, score, corrects: [] }]);
		await expect(desk.card.getByText('two scores: settle it')).toBeVisible();
	};

	await desk.press('m');
	await desk.page.keyboard.type('3');
	await desk.press('Enter');

	await trial(null, 'Enter');
	await trial('1', 'n');
	await trial('2', 'a');
	await trial('3', 's');
	await trial('12', 'Enter');
	await trial('7B', 'Enter');
	await ring('tag 2, open, 1 of 1 disturbed');
	await trial('5', 'Enter');
	await trial('1', 'Enter');
	await trial(null, 'Enter');
	await trial('2', 'n');
	await trial('3', 'Enter');
	await trial('12', 'n');
	await desk.press('g');
	await ring('tag 12, open, 0 of 1 disturbed, 1 not counted');
	await trial('7B', 'n');
	await alsoScored('intact');
	await expect(surgeon.page.getByText('contested').first()).toBeVisible();
	await desk.score('n');
	await ring('tag 7B, open, 1 of 2 disturbed');
	await trial('5', 'n');
	await desk.press('Backspace');
	await desk.isNow('5');
	await desk.press('Backspace');
	await desk.isFree();
	await ring('tag 5, open, 0 of 1 disturbed');

	await desk.reload();
	await patient.page.reload();
	await surgeon.page.reload();
	await ring('tag 2, open, 2 of 2 disturbed');
	await expect(desk.patientStatus).toContainText(/waits for one touch|not full screen/);
	await patient.page.mouse.click(200, 200);
	await expect(desk.patientStatus).toContainText('on screen');

	await trial('3', 'n');
	await trial('1', 'Enter');
	await desk.press('ArrowUp', 'ArrowUp');
	await expect(desk.card.getByText('tag 3', { exact: true })).toBeVisible();
	await desk.typeTag('2');
	await desk.press('.');
	await expect(desk.card.getByText('tag 2', { exact: true })).toBeVisible();
	await desk.score('Enter');
	await ring('tag 2, positive, 2 of 3 disturbed');
	await trial('3', 'p');
	await trial('12', 'Enter');
	await trial('7B', 'Enter');
	await alsoScored('anomia');
	await trial('3', 'Enter');
	await trial('12', 'Enter');
	await trial('5', 'Enter');
	await trial(null, 'n');

	await desk.press('l', 'm', 'ArrowUp', 'Enter');
	await expect(desk.card.getByText('next, object naming, German')).toBeVisible();
	await expect(desk.page.getByRole('button', { name: '3.5 mA' })).toBeVisible();
	await trial('5', 'n');
	await trial('2', 'Enter');
	await trial('5', 's');
	await trial('2', 'Enter');
	await trial('5', 'n');
	await trial('2', 'Enter');

	await desk.allSaved();
	const map = await found.map();
	expect(map.sites).toEqual(SITES);
	expect(map.tags).toEqual(TAGS);
	await surgeon.shows(RINGS);
	for (const words of ['2 positive', '3 negative', '1 open', 'Contested: Tag 7B']) {
		await expect(surgeon.page.getByText(words, { exact: true })).toBeVisible();
	}
	await expect(surgeon.page.getByText(/Not up to date/)).toHaveCount(0);
	await desk.press('l');
	await expect(desk.page.getByText('1 of 3', { exact: true })).toBeVisible();

	// Every trial was before the patient's eyes, once.
	const onsets = await found.entries('trial-onset');
	expect(onsets.every(({ shown }) => shown)).toBe(true);
	const presented = (await found.presented()).map(({ trial: id }) => id);
	expect(onsets.map(({ trial: id }) => id).sort()).toEqual(presented.sort());
	for (const { page } of [desk, patient, surgeon]) await page.context().close();
});
