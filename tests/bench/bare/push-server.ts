import { readFileSync } from 'node:fs';
import { createServer, type ServerResponse } from 'node:http';

/**
 * The least that carries a key press from one page to another: a page that sends, by BroadcastChannel or by POST, and a
 * page that hears it, by BroadcastChannel or as a server-sent event, and shows it at once. Nothing is stored or checked.
 *
 * Started with PORT and PICTURE, the path of a picture that the hearing page shows; says "listening" once it does.
 */
const picture = readFileSync(process.env.PICTURE!);
const listeners = new Set<ServerResponse>();

/** Sends the time of the key by the way that the address names: #channel or #server. */
const SENDER = `<!doctype html><title>sender</title><script>
	const channel = new BroadcastChannel('bare');
	let sent = 0;
	addEventListener('keydown', (event) => {
		const message = { id: String(++sent) };
		if (location.hash === '#channel') return channel.postMessage(message);
		const headers = { 'content-type': 'application/json' };
		void fetch('/send', { method: 'POST', headers, body: JSON.stringify(message) });
	});
</script>`;

/** Shows each message twice: in the name of an element, and as a picture with a name of its own. */
const HEARER = `<!doctype html><title>hearer</title><p aria-label="none">cell</p><div></div><script>
	const cell = document.querySelector('p');
	const stage = document.querySelector('div');
	const show = async ({ id }) => {
		cell.setAttribute('aria-label', id);
		const image = new Image(600, 600);
		image.setAttribute('elementtiming', id);
		image.src = '/picture';
		await image.decode();
		stage.replaceChildren(image);
	};
	const channel = new BroadcastChannel('bare');
	channel.onmessage = ({ data }) => show(data);
	new EventSource('/stream').onmessage = ({ data }) => show(JSON.parse(data));
	new Image().src = '/picture';
</script>`;

/** As Wordkeep's, so that the browser measures as finely here as there. */
const HEADERS = { 'cross-origin-opener-policy': 'same-origin', 'cross-origin-embedder-policy': 'require-corp' };

createServer((request, response) => {
	const answer = (type: string, body: string | Buffer, more = {}) =>
		response.writeHead(200, { ...HEADERS, 'content-type': type, ...more }).end(body);
	if (request.url === '/sender') return answer('text/html', SENDER);
	if (request.url === '/hearer') return answer('text/html', HEARER);
	if (request.url === '/picture') return answer('image/webp', picture, { 'cache-control': 'max-age=3600' });
	if (request.url === '/stream') {
		response.writeHead(200, { ...HEADERS, 'content-type': 'text/event-stream', 'cache-control': 'no-store' });
		response.write('retry: 500\n\n');
		listeners.add(response);
		return response.on('close', () => listeners.delete(response));
	}
	if (request.url !== '/send') return response.writeHead(404).end();
	const chunks: Buffer[] = [];
	request.on('data', (chunk: Buffer) => chunks.push(chunk));
	request.on('end', () => {
		const message = JSON.stringify(JSON.parse(Buffer.concat(chunks).toString('utf8')));
		for (const listener of listeners) listener.write(`data: ${message}\n\n`);
		answer('application/json', '{}');
	});
}).listen(Number(process.env.PORT), () => console.log('listening'));
