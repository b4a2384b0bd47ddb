import { patientViewsOf } from '$lib/server/live/patient-views';
import { logOf } from '$lib/server/log/log';
import type { PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ params, setHeaders }) => {
	setHeaders({ 'cache-control': 'private, no-store' });
	const { code } = params;
	const [log, views] = await Promise.all([logOf(code), patientViewsOf(code)]);
	return { code, log, views };
};
