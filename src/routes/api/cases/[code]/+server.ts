import { json } from '@sveltejs/kit';
import { z } from 'zod';
import { readJson } from '$lib/server/answer';
import { caseFields } from '$lib/server/cases/case-schema';
import { caseByCode, changeCase, isOnTeam } from '$lib/server/cases/cases';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = ({ locals }) => {
	const { code, team, createdAt } = locals.case;
	return json(isOnTeam(locals.case, locals.account!) ? locals.case : { code, team, createdAt });
};

const schema = z.strictObject(caseFields).partial();

export const PATCH: RequestHandler = async ({ request, locals }) => {
	const body = await readJson(request, schema);
	if (!body.ok) return body.response;
	await changeCase(locals.case.code, body.value);
	return json(await caseByCode(locals.case.code));
};
