import { json } from '@sveltejs/kit';
import { z } from 'zod';
import { REFUSALS } from '$lib/messages/refusals';
import { accountFields } from '$lib/server/accounts/account-schema';
import { changeAccount } from '$lib/server/accounts/accounts';
import { readJson, refusal } from '$lib/server/answer';
import type { RequestHandler } from './$types';

const schema = z
	.strictObject({ name: accountFields.name, roles: accountFields.roles, disabled: z.boolean() })
	.partial();

export const PATCH: RequestHandler = async ({ request, params }) => {
	const body = await readJson(request, schema);
	if (!body.ok) return body.response;
	const changed = await changeAccount(params.id, body.value);
	if (changed === null) return refusal(404, REFUSALS.noAccount);
	if (changed === 'last-administrator') {
		return refusal(409, REFUSALS.lastAdministrator);
	}
	return json(changed);
};
