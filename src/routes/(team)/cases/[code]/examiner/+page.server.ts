import { logOf } from '$lib/server/log/log';
import { patientViewsOf } from '$lib/server/live/patient-views';
import type { PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ locals, setHeaders }) => {
	setHeaders({ 'cache-control': 'private, no-store' });
	const { code, hemisphere, languages } = locals.case;
	const [log, views] = await Promise.all([logOf(code), patientViewsOf(code)]);
	return { case: { code, hemisphere, languages }, log, views };
};
