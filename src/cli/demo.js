import { build } from './build.js';
import { giveUp, install } from './install.js';
import { serve } from './serve.js';

const DEFAULT_PORT = 4173;

const { driver } = await install();
await driver;
await build();

process.env.WORDKEEP_DEMO = '1';
const port = Number(process.env.PORT ?? DEFAULT_PORT);
try {
	await serve({ port, host: process.env.HOST ?? '0.0.0.0' });
	console.log(`\nWordkeep serves on http://localhost:${port} (Ctrl+C ends it)`);
} catch (error) {
	const busy = error instanceof Error && 'code' in error && error.code === 'EADDRINUSE';
	giveUp(busy ? `Port ${port} is in use. Set PORT to another one.` : String(error));
}
