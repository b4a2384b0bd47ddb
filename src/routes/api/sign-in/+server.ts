import { json } from '@sveltejs/kit';
import { z } from 'zod';
import { REFUSALS } from '$lib/messages/refusals';
import { startSession } from '$lib/server/accounts/sessions';
import { signIn } from '$lib/server/accounts/sign-in';
import { readJson, refusal } from '$lib/server/answer';
import type { RequestHandler } from './$types';

const schema = z.object({ email: z.string().max(320), password: z.string().max(1024) });

export const POST: RequestHandler = async ({ request, cookies, url, getClientAddress }) => {
	const body = await readJson(request, schema);
	if (!body.ok) return body.response;
	const result = await signIn(body.value.email, body.value.password, getClientAddress());
	if (!result.ok && result.why === 'wait') {
		return refusal(429, REFUSALS.waitToSignIn(result.seconds), { seconds: result.seconds });
	}
	if (!result.ok) return refusal(401, REFUSALS.wrongSignIn);
	await startSession(cookies, url, result.account);
	const { id, email, name, roles } = result.account;
	return json({ account: { id, email, name, roles } });
};
