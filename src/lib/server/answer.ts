import { json } from '@sveltejs/kit';
import type { z } from 'zod';
import { REFUSALS } from '$lib/messages/refusals';

/** An answer that says what was wrong, in the form every API route uses. */
export function refusal(status: number, error: string, more: Record<string, unknown> = {}): Response {
	return json({ error, ...more }, { status });
}

export type Body<T> = { ok: true; value: T } | { ok: false; response: Response };

/** Reads a JSON body and checks it: 400 for what is not JSON, 422 for what does not fit, naming the fields. */
export async function readJson<S extends z.ZodType>(request: Request, schema: S): Promise<Body<z.infer<S>>> {
	let given: unknown;
	try {
		given = await request.json();
	} catch {
		return { ok: false, response: refusal(400, REFUSALS.notJson) };
	}
	const parsed = schema.safeParse(given);
	if (parsed.success) return { ok: true, value: parsed.data };
	const fields = parsed.error.issues.map(({ path, message }) => `${path.join('.') || 'request'}: ${message}`);
	return {
		ok: false,
		response: refusal(422, fields.join('; '), { fields: parsed.error.issues.map((i) => i.path.join('.')) })
	};
}
