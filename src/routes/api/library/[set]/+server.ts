import { json } from '@sveltejs/kit';
import { REFUSALS } from '$lib/messages/refusals';
import { refusal } from '$lib/server/answer';
import { findSet, LibraryMissing } from '$lib/server/library';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = async ({ params }) => {
	try {
		const set = await findSet(params.set);
		return set ? json(set) : refusal(404, REFUSALS.noSet(params.set));
	} catch (failure) {
		if (failure instanceof LibraryMissing) return refusal(503, failure.message);
		throw failure;
	}
};
