import { error, fail, redirect } from '@sveltejs/kit';
import { acceptInvitation, invitee } from '$lib/server/accounts/invitations';
import { passwordAdvice } from '$lib/server/accounts/password-choice';
import { hashPassword, MIN_PASSWORD_LENGTH } from '$lib/server/accounts/passwords';
import { endSession, startSession } from '$lib/server/accounts/sessions';
import { INVITATION } from '$lib/messages/open';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ params, setHeaders }) => {
	setHeaders({ 'cache-control': 'no-store' });
	const account = await invitee(params.token);
	if (!account) error(404, INVITATION.gone);
	return { name: account.name, email: account.email, joined: account.joined, least: MIN_PASSWORD_LENGTH };
};

export const actions: Actions = {
	default: async ({ request, params, locals, cookies, url }) => {
		if (!(await invitee(params.token))) error(404, INVITATION.gone);
		const password = String((await request.formData()).get('password') ?? '');
		const fault = passwordAdvice(password);
		if (fault) return fail(422, { fault });
		const account = await acceptInvitation(params.token, await hashPassword(password));
		if (!account) error(404, INVITATION.gone);
		await endSession(cookies, url, locals);
		await startSession(cookies, url, account);
		redirect(303, '/cases');
	}
};
