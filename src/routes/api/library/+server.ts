import { json } from '@sveltejs/kit';
import { refusal } from '$lib/server/answer';
import { LibraryMissing, listSets } from '$lib/server/library';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = async () => {
	try {
		return json({ sets: await listSets() });
	} catch (failure) {
		if (failure instanceof LibraryMissing) return refusal(503, failure.message);
		throw failure;
	}
};
