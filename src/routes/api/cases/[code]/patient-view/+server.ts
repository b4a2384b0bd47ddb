import { json } from '@sveltejs/kit';
import { z } from 'zod';
import { REFUSALS } from '$lib/messages/refusals';
import { readJson, refusal } from '$lib/server/answer';
import { addressesFor } from '$lib/server/live/addresses';
import { hub, patientRoom, staffRoom } from '$lib/server/live/hub';
import {
	confirmPatientView,
	endPatientViews,
	offerPatientView,
	patientViewsOf,
	type PatientView
} from '$lib/server/live/patient-views';
import type { RequestHandler } from './$types';

/** Which patient view is active, and which one waits. */
export const GET: RequestHandler = async ({ locals }) => json(await patientViewsOf(locals.case.code));

/** Offers a code, with the addresses that other devices reach. */
export const POST: RequestHandler = async ({ locals, url }) => {
	const { pairingCode, expiresAt, view } = await offerPatientView(locals.case.code, locals.account!.id);
	const links = addressesFor(url).map((address) => `${address}/patient#${pairingCode}`);
	return json({ id: view.id, code: pairingCode, expiresAt, links }, { status: 201 });
};

const confirmation = z.strictObject({ id: z.guid() });

/** Confirms the device that waits. */
export const PUT: RequestHandler = async ({ request, locals }) => {
	const body = await readJson(request, confirmation);
	if (!body.ok) return body.response;
	const confirmed = await confirmPatientView(locals.case.code, body.value.id);
	if (!confirmed) return refusal(409, REFUSALS.deviceGone);
	confirmed.replaced.forEach(tellEnded);
	tellStaff(locals.case.code);
	return json(confirmed.view);
};

/** Ends the patient view and every code on offer. */
export const DELETE: RequestHandler = async ({ locals }) => {
	(await endPatientViews(locals.case.code)).forEach(tellEnded);
	tellStaff(locals.case.code);
	return new Response(null, { status: 204 });
};

function tellEnded(view: PatientView): void {
	hub.passing(patientRoom(view.id), { name: 'ended', data: {} });
}

function tellStaff(code: string): void {
	hub.passing(staffRoom(code), { name: 'pairing', data: {} });
}
