import { expect, type BrowserContext, type Locator, type Page } from '@playwright/test';
import type { Desk } from './desk';

/** The screen before the patient. */
export class PatientScreen {
	private constructor(readonly page: Page) {}

	/** Pairs a new window as the staff do: code, number on both screens, one touch, ready. */
	static async pair(context: BrowserContext, desk: Desk): Promise<PatientScreen> {
		const screen = new PatientScreen(await context.newPage());
		const panel = desk.page.getByRole('region', { name: 'patient view' });
		await desk.patientStatus.click();
		await panel.getByRole('button', { name: 'pair a patient view' }).click();
		const link = await panel.getByRole('img').getAttribute('aria-label');
		const code = /#.*$/.exec(link ?? '')?.[0];
		await screen.page.goto(`${new URL(desk.page.url()).origin}/patient${code}`);
		const seen = await screen.page.getByText(/^The examiner sees \d\d too$/).textContent();
		await expect(panel.getByText(`It must show ${/\d\d/.exec(seen!)![0]}.`)).toBeVisible();
		await panel.getByRole('button', { name: 'yes, this is it' }).click();
		await screen.page.getByRole('button', { name: 'Sound and full screen' }).click();
		await screen.page.getByRole('button', { name: 'Ready' }).click();
		await expect(desk.patientStatus).toContainText('on screen');
		await expect(panel).toHaveCount(0);
		return screen;
	}

	/** What is before the patient's eyes; nothing between items. */
	get stage(): Locator {
		return this.page.getByTestId('stage');
	}

	async shows(text: string | RegExp): Promise<void> {
		await expect(this.stage).toHaveText(text);
	}

	async isBlank(): Promise<void> {
		await expect(this.stage.locator('*')).toHaveCount(0);
	}

	/** One whole trial: the item is before the patient's eyes before it is scored, and gone afterwards. */
	async trial(desk: Desk, tag: string | null, key: string): Promise<void> {
		if (tag === null) await desk.showControl();
		else await desk.show(tag);
		await expect(this.stage.locator('img, p')).toBeVisible();
		await desk.score(key);
		await this.isBlank();
	}
}
