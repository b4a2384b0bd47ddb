import { readAppend } from '$lib/server/log/append-request';
import { store } from '$lib/server/log/store';
import type { RequestHandler } from './$types';

/** What became of a presentation: the one kind of entry a patient view makes. */
export const POST: RequestHandler = async ({ request, locals }) => {
	const view = locals.patientView!;
	const body = await readAppend(request, ({ type, by }) => {
		if (type !== 'trial-onset') return 'type: a patient view says only what it has shown';
		return by === undefined ? null : 'by: a patient view acts for nobody';
	});
	if (!body.ok) return body.response;
	return await store(view.case, view.id, body.value);
};
