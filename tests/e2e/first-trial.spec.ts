import { expect, test } from '@playwright/test';
import { startServer } from '../api/server';

/** The way of a newcomer on one computer: from what the demo prints to the first scored trial. */
test('walks from the printed links to a first scored trial', async ({ context }) => {
	const server = await startServer({ env: { WORDKEEP_DEMO: '1', DEMO_PASSWORD: 'a password for the demo' } });
	try {
		const printed = server.printed.join('\n');
		const examinerLink = /open (http\S+\/examiner)/.exec(printed)?.[1];
		const patientLink = /second window: (http\S+)/.exec(printed)?.[1];
		const email = /(examiner@\S+)/.exec(printed)?.[1];
		const password = /Password\s+(.+)/.exec(printed)?.[1];

		const examiner = await context.newPage();
		await examiner.goto(examinerLink!);
		await examiner.getByLabel('E-mail').fill(email!);
		await examiner.getByLabel('Password').fill(password!);
		await examiner.keyboard.press('Enter');
		await expect(examiner.getByText('No trial yet')).toBeVisible();

		const patient = await context.newPage();
		await patient.goto(patientLink!);
		await examiner.bringToFront();
		await examiner.getByRole('button', { name: 'yes, this is it' }).click();
		await patient.bringToFront();
		await patient.getByRole('button', { name: 'Sound and full screen' }).click();
		await patient.getByRole('button', { name: 'Ready' }).click();

		await examiner.bringToFront();
		await expect(examiner.getByRole('button', { name: /^patient view/ })).toContainText(
			/on screen|full screen|loading/
		);
		await examiner.keyboard.press('1');
		await examiner.keyboard.press('Space');
		await expect(patient.locator('img')).toBeVisible();
		await examiner.keyboard.press('Enter');
		await expect(patient.locator('img')).toHaveCount(0);
		await expect(examiner.getByRole('region', { name: 'last trials' })).toContainText('intact');

		const code = /cases\/([^/]+)\/examiner/.exec(examinerLink!)![1];
		await expect
			.poll(async () => {
				const map = (await (await context.request.get(`${server.url}/api/cases/${code}/map`)).json()) as {
					sites: { tag: string; valid: number; disturbed: number }[];
				};
				return map.sites.map(({ tag, valid, disturbed }) => ({ tag, valid, disturbed }));
			})
			.toEqual([{ tag: '1', valid: 1, disturbed: 0 }]);
	} finally {
		await server.discard();
	}
});

test('keeps what the demo holds over a second start', async () => {
	const env = { WORDKEEP_DEMO: '1' };
	const first = await startServer({ env });
	const passwordOf = (lines: string[]) => /Password\s+(.+)/.exec(lines.join('\n'))?.[1];
	const casesOf = (lines: string[]) => /Cases\s+(.+)/.exec(lines.join('\n'))?.[1];
	await first.stop();
	const second = await startServer({ env, dataDir: first.dataDir });
	try {
		expect(passwordOf(first.printed)).toHaveLength(16);
		expect(passwordOf(second.printed)).toBe(passwordOf(first.printed));
		expect(casesOf(second.printed)).toBe(casesOf(first.printed));
	} finally {
		await second.discard();
	}
});
