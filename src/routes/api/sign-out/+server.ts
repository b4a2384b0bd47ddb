import { endSession } from '$lib/server/accounts/sessions';
import type { RequestHandler } from './$types';

export const POST: RequestHandler = async ({ locals, cookies, url }) => {
	await endSession(cookies, url, locals);
	return new Response(null, { status: 204 });
};
