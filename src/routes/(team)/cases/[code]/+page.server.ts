import { APPENDERS, READERS } from '$lib/server/accounts/roles';
import { isOnTeam } from '$lib/server/cases/cases';
import { namesIn } from '$lib/server/cases/names';
import { logOf } from '$lib/server/log/log';
import type { PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ locals, params }) => {
	const account = locals.account!;
	// The framework loads another case only when the load has read which one it is about.
	const { code } = params;
	const { team, createdAt } = locals.case;
	const isAdministrator = account.roles.includes('administrator');
	const reads = isOnTeam(locals.case, account) && account.roles.some((role) => READERS.includes(role));
	if (!reads) return { code, team, createdAt, isAdministrator, content: null };

	const log = await logOf(code);
	const content = {
		header: locals.case,
		log,
		names: await namesIn(log, team),
		mayAppend: account.roles.some((role) => APPENDERS.includes(role))
	};
	return { code, team, createdAt, isAdministrator, content };
};
