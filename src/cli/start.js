import { existsSync } from 'node:fs';
import { serve } from './serve.js';

const DEFAULT_PORT = 4173;

const port = Number(process.env.PORT ?? DEFAULT_PORT);
const host = process.env.HOST ?? '0.0.0.0';

if (!existsSync(new URL('../../build/handler.js', import.meta.url))) {
	console.error('Wordkeep is not built yet. Run: npm ci && npm run build');
	process.exit(1);
}

try {
	await serve({ port, host });
	console.log(`Wordkeep serves on http://localhost:${port}`);
} catch (error) {
	const busy = error instanceof Error && 'code' in error && error.code === 'EADDRINUSE';
	console.error(busy ? `Port ${port} is in use. Set PORT to another one.` : error);
	process.exit(1);
}
