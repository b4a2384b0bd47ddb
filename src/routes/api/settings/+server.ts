import { json } from '@sveltejs/kit';
import { z } from 'zod';
import { readJson } from '$lib/server/answer';
import { changeSettings, isZone, readSettings } from '$lib/server/settings';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = async () => json(await readSettings());

const schema = z
	.strictObject({ zone: z.string().max(100).refine(isZone, 'A time zone by its IANA name, such as Europe/Berlin.') })
	.partial();

export const PATCH: RequestHandler = async ({ request }) => {
	const body = await readJson(request, schema);
	if (!body.ok) return body.response;
	await changeSettings(body.value);
	return json(await readSettings());
};
