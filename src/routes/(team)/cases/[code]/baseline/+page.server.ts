import { patientViewsOf } from '$lib/server/live/patient-views';
import { logOf } from '$lib/server/log/log';
import type { PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ locals, setHeaders }) => {
	setHeaders({ 'cache-control': 'private, no-store' });
	const { code } = locals.case;
	const [log, views] = await Promise.all([logOf(code), patientViewsOf(code)]);
	return { code, log, views };
};
