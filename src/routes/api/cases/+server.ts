import { json } from '@sveltejs/kit';
import { z } from 'zod';
import { HEMISPHERES } from '$lib/mapping/vocabulary';
import { REFUSALS } from '$lib/messages/refusals';
import { readJson, refusal } from '$lib/server/answer';
import { createCase, isOnTeam, listCases, UnknownAccount, type Case } from '$lib/server/cases/cases';
import { caseFields } from '$lib/server/cases/case-schema';
import type { RequestHandler } from './$types';

/** The cases whose team one is on; an administrator sees of the others who is on them. */
export const GET: RequestHandler = async ({ locals }) => {
	const account = locals.account!;
	const administrator = account.roles.includes('administrator');
	const visible = (await listCases()).filter((found) => administrator || isOnTeam(found, account));
	return json({ cases: visible.map((found) => (isOnTeam(found, account) ? found : withoutContent(found))) });
};

function withoutContent({ code, team, createdAt }: Case) {
	return { code, team, createdAt };
}

const schema = z.object({
	hemisphere: z.enum(HEMISPHERES),
	languages: caseFields.languages,
	team: z.array(z.string()).max(100).default([]),
	plannedOn: caseFields.plannedOn.optional(),
	note: caseFields.note.optional()
});

export const POST: RequestHandler = async ({ request, locals }) => {
	const body = await readJson(request, schema);
	if (!body.ok) return body.response;
	try {
		return json(await createCase(body.value, locals.account!), { status: 201 });
	} catch (failure) {
		if (failure instanceof UnknownAccount) return refusal(422, REFUSALS.team(failure.message), { fields: ['team'] });
		throw failure;
	}
};
