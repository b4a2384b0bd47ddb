import { REFUSALS } from '$lib/messages/refusals';
import { refusal } from '$lib/server/answer';
import { mediaFolder, serveFile } from '$lib/server/media/serve-file';
import type { RequestHandler } from './$types';

/** One picture or sound of an item set. */
export const GET: RequestHandler = async ({ params, request }) => {
	const served = await serveFile(mediaFolder(), params.file, request.headers.get('if-none-match'));
	return served ?? refusal(404, REFUSALS.noMedia);
};
