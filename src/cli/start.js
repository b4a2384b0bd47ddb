import { existsSync } from 'node:fs';
import { giveUp } from './install.js';
import { serve } from './serve.js';

const DEFAULT_PORT = 4173;

if (!existsSync(new URL('../../build/handler.js', import.meta.url))) {
	giveUp('Wordkeep is not built yet. Run: npm ci && npm run build');
}

const port = Number(process.env.PORT ?? DEFAULT_PORT);
try {
	await serve({ port, host: process.env.HOST ?? '0.0.0.0' });
	console.log(`Wordkeep serves on http://localhost:${port}`);
} catch (error) {
	const busy = error instanceof Error && 'code' in error && error.code === 'EADDRINUSE';
	giveUp(busy ? `Port ${port} is in use. Set PORT to another one.` : String(error));
}
