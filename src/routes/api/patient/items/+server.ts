import { json } from '@sveltejs/kit';
import { caseItems } from '$lib/mapping/case-items';
import { fold } from '$lib/mapping/fold';
import { logOf } from '$lib/server/log/log';
import type { RequestHandler } from './$types';

/** The media of the case, to load ahead: file names alone, without what they are. */
export const GET: RequestHandler = async ({ locals }) => {
	const items = caseItems(fold(await logOf(locals.patientView!.case)));
	const pictures = new Map<string, { file: string; width: number }[]>();
	const sounds = new Set<string>();
	for (const prompt of items.flatMap((item) => (item.kept ? item.prompts : []))) {
		if (prompt.kind === 'picture') pictures.set(JSON.stringify(prompt.files), prompt.files);
		if (prompt.kind === 'sound') sounds.add(prompt.file);
	}
	return json({ pictures: [...pictures.values()], sounds: [...sounds] }, { headers: { 'cache-control': 'no-store' } });
};
