import { logOf } from '$lib/server/log/log';
import { readSettings } from '$lib/server/settings';
import type { PageServerLoad } from './$types';

/** The screen is drawn where its size is known. */
export const ssr = false;

export const load: PageServerLoad = async ({ locals, params, setHeaders }) => {
	setHeaders({ 'cache-control': 'private, no-store' });
	// The framework loads another case only when the load has read which one it is about.
	const { code } = params;
	const { hemisphere, languages } = locals.case;
	const { zone } = await readSettings();
	return { header: { code, hemisphere, languages }, log: await logOf(code), zone };
};
