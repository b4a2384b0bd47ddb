import { z } from 'zod';
import type { PatientPresence } from '$lib/stimuli/display';
import { readJson } from '$lib/server/answer';
import { hear } from '$lib/server/live/presence';
import { serverNow } from '$lib/server/live/server-clock';
import type { RequestHandler } from './$types';

const schema = z.strictObject({
	visible: z.boolean(),
	fullScreen: z.boolean(),
	unlocked: z.boolean(),
	wakeLock: z.boolean(),
	ready: z.int().min(0),
	total: z.int().min(0),
	frameAge: z.number().min(0),
	calibrated: z.boolean()
}) satisfies z.ZodType<PatientPresence>;

export const POST: RequestHandler = async ({ request, locals }) => {
	const body = await readJson(request, schema);
	if (!body.ok) return body.response;
	const view = locals.patientView!;
	hear(view.case, { kind: 'patient', heardAt: serverNow(), view: view.id, connected: true, ...body.value });
	return new Response(null, { status: 204 });
};
