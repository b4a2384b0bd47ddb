import { readSettings } from '$lib/server/settings';
import type { LayoutServerLoad } from './$types';

/** Who is signed in and the zone that times are shown in. `hooks.server.ts` has let nobody else through. */
export const load: LayoutServerLoad = async ({ locals, setHeaders }) => {
	setHeaders({ 'cache-control': 'private, no-store' });
	const { id, email, name, roles } = locals.account!;
	return { account: { id, email, name, roles }, zone: (await readSettings()).zone };
};
