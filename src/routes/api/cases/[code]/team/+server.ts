import { json } from '@sveltejs/kit';
import { z } from 'zod';
import { REFUSALS } from '$lib/messages/refusals';
import { readJson, refusal } from '$lib/server/answer';
import { caseByCode, setTeam, UnknownAccount } from '$lib/server/cases/cases';
import { endStreamsOf } from '$lib/server/live/access';
import type { RequestHandler } from './$types';

const schema = z.strictObject({ team: z.array(z.string()).max(100) });

export const PUT: RequestHandler = async ({ request, locals }) => {
	const body = await readJson(request, schema);
	if (!body.ok) return body.response;
	try {
		await setTeam(locals.case.code, body.value.team);
	} catch (failure) {
		if (failure instanceof UnknownAccount) return refusal(422, REFUSALS.team(failure.message), { fields: ['team'] });
		throw failure;
	}
	const { code, team } = (await caseByCode(locals.case.code))!;
	endStreamsOf(locals.case.team.map(({ id }) => id).filter((id) => !team.some((member) => member.id === id)));
	return json({ code, team });
};
