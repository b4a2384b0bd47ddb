import { expect, type BrowserContext, type Locator, type Page } from '@playwright/test';
import { signIn, type TheatreCase } from './clinic';
import type { Member } from '../../api/server';

/** The examiner's desk, worked by its keys alone unless a step says touch. */
export class Desk {
	private constructor(readonly page: Page) {}

	static async open(context: BrowserContext, member: Member, { code }: TheatreCase): Promise<Desk> {
		await signIn(context, member);
		const desk = new Desk(await context.newPage());
		await desk.page.goto(`${member.client.url}/cases/${code}/examiner`);
		await desk.works();
		return desk;
	}

	/** Waits until entries can be saved on this device. */
	async works(): Promise<void> {
		await expect(
			this.page.getByText('saved here', { exact: true }).locator('circle[fill="currentColor"]')
		).toBeVisible();
	}

	async reload(): Promise<void> {
		await this.page.reload();
		await this.works();
	}

	/** Presses keys one after the other. */
	async press(...keys: string[]): Promise<void> {
		for (const key of keys) await this.page.keyboard.press(key);
	}

	/** Presses keys before the page has done anything with the first of them: letters and digits, by their codes. */
	async pressAtOnce(...codes: string[]): Promise<void> {
		await this.page.evaluate((all) => {
			const names: Record<string, string> = { Space: ' ', Enter: 'Enter', Backspace: 'Backspace' };
			for (const code of all) {
				const key = names[code] ?? code.replace(/^Digit|^Key/, '').toLowerCase();
				document.body.dispatchEvent(new KeyboardEvent('keydown', { code, key, bubbles: true, cancelable: true }));
			}
		}, codes);
	}

	tagButton(tag: string): Locator {
		return this.page.getByRole('button', { name: new RegExp(`^tag ${tag},`) });
	}

	async typeTag(tag: string): Promise<void> {
		await this.press(...[...tag].map((character) => (/\d/.test(character) ? character : `Shift+${character}`)));
		await expect(this.tagButton(tag)).toHaveAttribute('aria-pressed', 'true');
	}

	/** The trial or item in the middle, with its caption. */
	get card(): Locator {
		return this.page.getByRole('main').locator('div:has(> .caption)').first();
	}

	/** Waits until the trial at a tag, or a control, is named large. */
	async isNow(tag: string | null): Promise<void> {
		await expect(this.card.getByText('now', { exact: true })).toBeVisible();
		await expect(this.card.getByText(tag === null ? 'control' : `tag ${tag}`, { exact: true })).toBeVisible();
	}

	/** Waits until no trial is named large and the next item is. */
	async isFree(): Promise<void> {
		await expect(this.card.getByText(/^next/)).toBeVisible();
	}

	/** Shows the next item at a tag. */
	async show(tag: string): Promise<void> {
		await this.typeTag(tag);
		await this.press('Space');
		await this.isNow(tag);
	}

	/** Shows the next item without stimulation. */
	async showControl(): Promise<void> {
		await this.press('c');
		await this.isNow(null);
	}

	async score(key: string): Promise<void> {
		await this.press(key);
		await this.isFree();
	}

	/** One whole trial. */
	async trial(tag: string | null, key: string): Promise<void> {
		if (tag === null) await this.showControl();
		else await this.show(tag);
		await this.score(key);
	}

	get status(): Locator {
		return this.page.locator('footer');
	}

	get patientStatus(): Locator {
		return this.status.getByRole('button', { name: /^patient view/ });
	}

	/** What the examiner is told in passing. */
	get hint(): Locator {
		return this.page.getByRole('main').getByRole('status');
	}

	/** The lines of the last trials, the newest first. */
	get lastTrials(): Locator {
		return this.page.getByRole('region', { name: 'last trials' }).getByRole('listitem');
	}

	async allSaved(): Promise<void> {
		await expect(this.status.getByText(/saved on the server/)).toBeVisible();
	}
}
