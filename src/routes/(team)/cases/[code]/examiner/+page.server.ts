import { logOf } from '$lib/server/log/log';
import { patientViewsOf } from '$lib/server/live/patient-views';
import type { PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ locals, params, setHeaders }) => {
	setHeaders({ 'cache-control': 'private, no-store' });
	// The framework loads another case only when the load has read which one it is about.
	const { code } = params;
	const { hemisphere, languages } = locals.case;
	const [log, views] = await Promise.all([logOf(code), patientViewsOf(code)]);
	return { case: { code, hemisphere, languages }, log, views };
};
