import { defineConfig } from '@playwright/test';

/** Real Chromium against the production build; every test file starts servers of its own. */
export default defineConfig({
	testDir: 'tests/e2e',
	globalSetup: './tests/api/build.ts',
	workers: 1,
	// In CI a test is asked a second time; one that needs it is named at the end, as a defect to be mended.
	retries: process.env.CI ? 1 : 0,
	forbidOnly: true,
	timeout: 60_000,
	reporter: 'list',
	use: {
		browserName: 'chromium',
		viewport: { width: 1280, height: 800 },
		launchOptions: {
			executablePath: process.env.CHROMIUM ?? '/usr/bin/chromium',
			args: [
				'--no-sandbox',
				'--disable-gpu',
				'--disable-quic',
				'--no-first-run',
				'--disable-background-networking',
				'--disable-component-update',
				'--disable-sync'
			]
		}
	}
});
