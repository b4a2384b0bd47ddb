import { networkInterfaces } from 'node:os';

/**
 * The addresses under which this server is reached: the one it was asked by, unless only this computer knows it;
 * then those of the network first, for a tablet or a phone.
 */
export function addressesFor(url: URL): string[] {
	if (!isLoopback(url.hostname)) return [url.origin];
	const port = url.port ? `:${url.port}` : '';
	return [...networkAddresses().map((address) => `${url.protocol}//${address}${port}`), url.origin];
}

function isLoopback(hostname: string): boolean {
	return hostname === 'localhost' || hostname === '[::1]' || hostname.startsWith('127.');
}

function networkAddresses(): string[] {
	return Object.values(networkInterfaces())
		.flatMap((addresses) => addresses ?? [])
		.filter(({ family, internal }) => family === 'IPv4' && !internal)
		.map(({ address }) => address);
}
