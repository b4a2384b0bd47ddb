import { fail, redirect } from '@sveltejs/kit';
import { endSession, startSession } from '$lib/server/accounts/sessions';
import { signIn } from '$lib/server/accounts/sign-in';
import { SIGN_IN } from '$lib/messages/open';
import type { Actions, PageServerLoad } from './$types';

const HOME = '/cases';

export const load: PageServerLoad = ({ locals, url }) => {
	const to = sameSite(url.searchParams.get('to'), url);
	if (locals.account) redirect(303, to);
	return { to };
};

/** Where to go after signing in: a path of this server, never another site. */
function sameSite(to: string | null, url: URL): string {
	if (!to?.startsWith('/')) return HOME;
	if (!URL.canParse(to, url.origin)) return HOME;
	const target = new URL(to, url.origin);
	return target.origin === url.origin ? target.pathname + target.search + target.hash : HOME;
}

export const actions: Actions = {
	in: async ({ request, cookies, url, getClientAddress }) => {
		const form = await request.formData();
		const email = String(form.get('email') ?? '');
		const result = await signIn(email, String(form.get('password') ?? ''), getClientAddress());
		if (!result.ok && result.why === 'wait') return fail(429, { email, message: SIGN_IN.wait(result.seconds) });
		if (!result.ok) return fail(401, { email, message: SIGN_IN.wrong });
		await startSession(cookies, url, result.account);
		redirect(303, sameSite(String(form.get('to') ?? ''), url));
	},
	out: async ({ locals, cookies, url }) => {
		await endSession(cookies, url, locals);
		redirect(303, '/sign-in');
	}
};
