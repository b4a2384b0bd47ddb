/** What the server answered. */
export interface Answer {
	status: number;
	headers: Headers;
	text: string;
	/** the JSON, where it is JSON */
	// eslint-disable-next-line @typescript-eslint/no-explicit-any -- the tests say what they expect in it
	body: any;
}

type Fields = Record<string, string>;

/** A program or a browser without scripts: keeps its cookies, follows no redirect. */
export class Client {
	readonly cookies = new Map<string, string>();

	constructor(readonly url: string) {}

	get(path: string, headers: Fields = {}): Promise<Answer> {
		return this.request('GET', path, { headers });
	}

	post(path: string, body: unknown = {}, headers: Fields = {}): Promise<Answer> {
		return this.json('POST', path, body, headers);
	}

	/** Any method with a JSON body. */
	json(method: string, path: string, body: unknown, headers: Fields = {}): Promise<Answer> {
		return this.request(method, path, {
			body: JSON.stringify(body),
			headers: { 'content-type': 'application/json', ...headers }
		});
	}

	/** Sends a form as the page does before its scripts are there. */
	form(path: string, fields: Fields, headers: Fields = {}): Promise<Answer> {
		return this.request('POST', path, {
			body: new URLSearchParams(fields),
			headers: { origin: this.url, accept: 'text/html', ...headers }
		});
	}

	async request(method: string, path: string, init: { body?: BodyInit; headers?: Fields } = {}): Promise<Answer> {
		const headers: Fields = { ...init.headers };
		if (this.cookies.size > 0) headers.cookie = [...this.cookies].map(([name, value]) => `${name}=${value}`).join('; ');
		const response = await fetch(this.url + path, { method, body: init.body, headers, redirect: 'manual' });
		this.#keep(response.headers.getSetCookie());
		const type = response.headers.get('content-type') ?? '';
		if (type.startsWith('text/event-stream')) {
			await response.body?.cancel();
			return { status: response.status, headers: response.headers, text: '', body: null };
		}
		const text = await response.text();
		const body: unknown = type.startsWith('application/json') ? JSON.parse(text) : null;
		return { status: response.status, headers: response.headers, text, body };
	}

	#keep(set: string[]): void {
		for (const cookie of set) {
			const [pair = '', ...attributes] = cookie.split(';');
			const at = pair.indexOf('=');
			const gone = attributes.some((attribute) => /^\s*max-age=0\s*$/i.test(attribute));
			if (gone) this.cookies.delete(pair.slice(0, at));
			else this.cookies.set(pair.slice(0, at), pair.slice(at + 1));
		}
	}

	/** Another client with the same cookies. */
	copy(): Client {
		const twin = new Client(this.url);
		for (const [name, value] of this.cookies) twin.cookies.set(name, value);
		return twin;
	}
}
