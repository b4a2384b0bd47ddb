import { endSession } from '$lib/server/accounts/sessions';
import type { RequestHandler } from './$types';

export const POST: RequestHandler = async ({ locals, cookies, url }) => {
	if (locals.session) await endSession(cookies, url, locals.session);
	return new Response(null, { status: 204 });
};
