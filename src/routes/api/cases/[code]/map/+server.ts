import { json } from '@sveltejs/kit';
import { fold } from '$lib/mapping/fold';
import { sites, tagResults } from '$lib/mapping/sites';
import { CLASSES, type ResponseClass } from '$lib/mapping/vocabulary';
import { REFUSALS } from '$lib/messages/refusals';
import { refusal } from '$lib/server/answer';
import { logOf } from '$lib/server/log/log';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = async ({ locals, url }) => {
	const asked = (url.searchParams.get('class') ?? 'language') as ResponseClass;
	if (!CLASSES.includes(asked)) return refusal(422, REFUSALS.oneOf('class', CLASSES));
	const state = fold(await logOf(locals.case.code));
	// Which trials are in a row is nobody's but the program's; what is undefined is left out of JSON.
	return json({ sites: sites(state, asked).map((row) => ({ ...row, trials: undefined })), tags: tagResults(state) });
};
