import { json } from '@sveltejs/kit';
import { readAppend } from '$lib/server/log/append-request';
import { entriesAfter } from '$lib/server/log/log';
import { positionOf } from '$lib/server/log/position';
import { store } from '$lib/server/log/store';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = async ({ locals, url }) => {
	const after = positionOf(url.searchParams.get('after'));
	if (!after.ok) return after.response;
	return json({ events: await entriesAfter(locals.case.code, after.position) });
};

export const POST: RequestHandler = async ({ request, locals }) => {
	const team = new Set(locals.case.team.map(({ id }) => id));
	const body = await readAppend(request, ({ by }) =>
		by === undefined || team.has(by) ? null : 'by: not on the team of this case'
	);
	if (!body.ok) return body.response;
	return await store(locals.case.code, locals.account!.id, body.value);
};
