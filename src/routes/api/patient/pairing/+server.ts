import { json } from '@sveltejs/kit';
import { RateLimiterMemory } from 'rate-limiter-flexible';
import { z } from 'zod';
import { REFUSALS } from '$lib/messages/refusals';
import { readJson, refusal } from '$lib/server/answer';
import { hub, staffRoom } from '$lib/server/live/hub';
import { writePatientToken } from '$lib/server/live/patient-cookie';
import { claimPatientView, CODE_MINUTES } from '$lib/server/live/patient-views';
import type { RequestHandler } from './$types';

/** How far this device is with pairing. */
export const GET: RequestHandler = ({ locals }) => {
	const view = locals.patientView;
	return json({ view: view?.id ?? null, state: view?.state ?? 'none', checkWord: view?.checkWord ?? null });
};

/** Wrong codes from one address while a code lasts. */
const tries = new RateLimiterMemory({ points: 5, duration: CODE_MINUTES * 60 });

const schema = z.strictObject({ code: z.string().min(1).max(40) });

/** Gives the code; the device then waits for the examiner's word. */
export const POST: RequestHandler = async ({ request, cookies, url, getClientAddress }) => {
	const body = await readJson(request, schema);
	if (!body.ok) return body.response;
	const from = getClientAddress();
	const wrong = await tries.get(from);
	if (wrong && wrong.remainingPoints <= 0) {
		return refusal(429, REFUSALS.tooManyCodes(Math.ceil(wrong.msBeforeNext / 60_000)));
	}
	const claimed = await claimPatientView(body.value.code);
	if (!claimed) {
		await tries.penalty(from);
		return refusal(404, REFUSALS.wrongCode);
	}
	await tries.delete(from);
	writePatientToken(cookies, url, claimed.token);
	hub.passing(staffRoom(claimed.view.case), { name: 'pairing', data: {} });
	return json({ view: claimed.view.id, state: claimed.view.state, checkWord: claimed.view.checkWord });
};
