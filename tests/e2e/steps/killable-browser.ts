import { chromium, test, type BrowserContext } from '@playwright/test';
import { mkdtempSync, readlinkSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

/** A browser with a profile on the disk, as on a clinic's computer: it can be killed and opened again. */
export class KillableBrowser {
	readonly #profile = mkdtempSync(join(tmpdir(), 'wordkeep-profile-'));
	#context: BrowserContext | undefined;

	async open(): Promise<BrowserContext> {
		const { launchOptions, viewport } = test.info().project.use;
		this.#context = await chromium.launchPersistentContext(this.#profile, { ...launchOptions, viewport });
		return this.#context;
	}

	/** Ends the browser as a power cut would. */
	async kill(): Promise<void> {
		// Chromium's lock on a profile names the computer and the process.
		const pid = /-(\d+)$/.exec(readlinkSync(join(this.#profile, 'SingletonLock')))![1];
		const closed = this.#context!.waitForEvent('close');
		process.kill(Number(pid), 'SIGKILL');
		await closed;
	}

	async discard(): Promise<void> {
		await this.#context?.close();
		rmSync(this.#profile, { recursive: true, force: true });
	}
}
