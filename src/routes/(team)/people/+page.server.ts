import { listPeople } from '$lib/server/accounts/people';
import type { PageServerLoad } from './$types';

export const load: PageServerLoad = async () => ({
	people: await listPeople(),
	zones: Intl.supportedValuesOf('timeZone')
});
