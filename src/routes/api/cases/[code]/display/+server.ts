import { json } from '@sveltejs/kit';
import { REFUSALS } from '$lib/messages/refusals';
import { readJson, refusal } from '$lib/server/answer';
import { displayCommand } from '$lib/server/live/display-schema';
import { hub, patientRoom } from '$lib/server/live/hub';
import { patientViewsOf } from '$lib/server/live/patient-views';
import type { RequestHandler } from './$types';

/** Passes a message on to the case's patient view; says how many screens were listening. */
export const POST: RequestHandler = async ({ request, locals }) => {
	const body = await readJson(request, displayCommand);
	if (!body.ok) return body.response;
	const { active } = await patientViewsOf(locals.case.code);
	if (!active) return refusal(409, REFUSALS.noView);
	const room = patientRoom(active.id);
	hub.passing(room, { name: 'display', data: body.value });
	return json({ listening: hub.count(room) });
};
