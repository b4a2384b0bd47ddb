import { APPENDERS } from '$lib/server/accounts/roles';
import type { PageServerLoad } from './$types';

export const load: PageServerLoad = ({ locals }) => {
	const { roles } = locals.account!;
	return {
		mayCreate: roles.some((role) => APPENDERS.includes(role)),
		isAdministrator: roles.includes('administrator')
	};
};
