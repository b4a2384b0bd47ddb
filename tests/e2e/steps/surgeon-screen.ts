import { expect, type BrowserContext, type Locator, type Page } from '@playwright/test';
import type { Member } from '../../api/server';
import { signIn, type TheatreCase } from './clinic';

/** The surgeon's screen, read from a metre: it is never touched. */
export class SurgeonScreen {
	private constructor(readonly page: Page) {}

	static async open(context: BrowserContext, member: Member, { code }: TheatreCase): Promise<SurgeonScreen> {
		await signIn(context, member);
		const screen = new SurgeonScreen(await context.newPage());
		await screen.page.goto(`${member.client.url}/cases/${code}/surgeon?distance=1000`);
		return screen;
	}

	get grid(): Locator {
		return this.page.getByRole('list', { name: 'Results of all tags' });
	}

	/** What the rings say to those who hear them, in order; with bars, those of a ring follow it. */
	async rings(): Promise<(string | null)[][]> {
		const places = await this.grid.getByRole('listitem').all();
		return await Promise.all(
			places.map(async (place) =>
				Promise.all((await place.getByRole('img').all()).map((image) => image.getAttribute('aria-label')))
			)
		);
	}

	async shows(rings: string[][]): Promise<void> {
		await expect.poll(() => this.rings()).toEqual(rings);
	}
}
