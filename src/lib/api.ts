/** How a page asks the API: JSON both ways, and a refusal is an error with the server's words. */

import { NO_ANSWER } from '$lib/messages/common';

/** The server answered and said no, or did not answer (status 0). */
export class Refused extends Error {
	constructor(
		readonly status: number,
		message: string,
		/** names of the fields that do not fit */
		readonly fields: string[] = []
	) {
		super(message);
	}

	/** What is wrong with a field, without its name; null when nothing is. The server says "field: why; field: why". */
	faultOf(field: string): string | null {
		const at = this.fields.indexOf(field);
		if (at < 0) return null;
		const said = this.message.split('; ')[at] ?? this.message;
		return said.startsWith(`${field}: `) ? said.slice(field.length + 2) : said;
	}
}

/** @throws Refused */
export async function ask<T>(method: 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE', path: string, body?: unknown) {
	let response: Response;
	try {
		response = await fetch(path, {
			method,
			headers: body === undefined ? {} : { 'content-type': 'application/json' },
			body: body === undefined ? undefined : JSON.stringify(body)
		});
	} catch {
		throw new Refused(0, NO_ANSWER);
	}
	const answer: unknown = response.status === 204 ? null : await response.json().catch(() => null);
	if (!response.ok) {
		const { error, fields } = (answer ?? {}) as { error?: string; fields?: string[] };
		throw new Refused(response.status, error ?? NO_ANSWER, fields);
	}
	return answer as T;
}
