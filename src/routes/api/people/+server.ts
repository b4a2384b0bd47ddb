import { json } from '@sveltejs/kit';
import { z } from 'zod';
import { REFUSALS } from '$lib/messages/refusals';
import { accountFields } from '$lib/server/accounts/account-schema';
import { createAccount } from '$lib/server/accounts/accounts';
import { linkFor, listPeople } from '$lib/server/accounts/people';
import { readJson, refusal } from '$lib/server/answer';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = async () => json({ people: await listPeople() });

const schema = z.strictObject(accountFields);

/** Makes an account without a password, and the one-time link to hand over. */
export const POST: RequestHandler = async ({ request }) => {
	const body = await readJson(request, schema);
	if (!body.ok) return body.response;
	const account = await createAccount(body.value);
	if (!account) return refusal(409, REFUSALS.knownAddress, { fields: ['email'] });
	const link = await linkFor(account);
	return json({ person: { ...account, linkUntil: link.expiresAt }, ...link }, { status: 201 });
};
