import { json } from '@sveltejs/kit';
import { REFUSALS } from '$lib/messages/refusals';
import { accountById } from '$lib/server/accounts/accounts';
import { linkFor } from '$lib/server/accounts/people';
import { refusal } from '$lib/server/answer';
import type { RequestHandler } from './$types';

/** Makes a new one-time link: the first was lost or is too old, or the password is forgotten. */
export const POST: RequestHandler = async ({ params }) => {
	const account = await accountById(params.id);
	if (!account) return refusal(404, REFUSALS.noAccount);
	if (account.disabled) return refusal(409, REFUSALS.disabledAccount);
	return json(await linkFor(account), { status: 201 });
};
