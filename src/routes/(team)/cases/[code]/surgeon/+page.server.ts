import { logOf } from '$lib/server/log/log';
import { readSettings } from '$lib/server/settings';
import type { PageServerLoad } from './$types';

/** The screen is drawn where its size is known. */
export const ssr = false;

export const load: PageServerLoad = async ({ locals }) => {
	const { code, hemisphere, languages } = locals.case;
	const { zone } = await readSettings();
	return { header: { code, hemisphere, languages }, log: await logOf(code), zone };
};
