import { z } from 'zod';
import { readJson } from '$lib/server/answer';
import { hear } from '$lib/server/live/presence';
import { serverNow } from '$lib/server/live/server-clock';
import type { RequestHandler } from './$types';

const schema = z.strictObject({
	device: z.string().min(1).max(200),
	waiting: z.int().min(0),
	oldest: z.number().min(0),
	leads: z.guid().nullable()
});

export const POST: RequestHandler = async ({ request, locals }) => {
	const body = await readJson(request, schema);
	if (!body.ok) return body.response;
	hear(locals.case.code, { kind: 'staff', heardAt: serverNow(), account: locals.account!.id, ...body.value });
	return new Response(null, { status: 204 });
};
