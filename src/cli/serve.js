import { createServer } from 'node:http';

/**
 * Serves the production build over http until the process is told to stop.
 *
 * The adapter's own server would need to be told one origin; a hospital's computers reach Wordkeep under several
 * addresses, so every request is taken under the address and protocol it really came by.
 *
 * @param {{ port: number, host: string }} options
 * @returns {Promise<import('node:http').Server>} once it answers
 */
export async function serve({ port, host }) {
	process.env.PROTOCOL_HEADER = 'x-forwarded-proto';
	process.env.PORT = String(port);
	/** @type {Promise<{ handler: import('node:http').RequestListener }> | undefined} */
	let application;
	const server = createServer((request, response) => {
		request.headers['x-forwarded-proto'] = 'http';
		void application?.then(({ handler }) => handler(request, response));
	});
	// The port first: when it is taken nothing else must have happened.
	await new Promise((listening, failed) => {
		server.once('error', failed);
		server.listen(port, host, () => listening(undefined));
	});
	for (const signal of ['SIGINT', 'SIGTERM']) process.once(signal, () => stop(server));
	application = import(new URL('../../build/handler.js', import.meta.url).href);
	await application;
	return server;
}

/** @param {import('node:http').Server} server */
function stop(server) {
	server.close(() => process.emit(/** @type {any} */ ('sveltekit:shutdown')));
	server.closeAllConnections();
}
