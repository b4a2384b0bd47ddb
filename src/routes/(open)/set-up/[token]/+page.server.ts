import { error, fail, redirect } from '@sveltejs/kit';
import { accountFields } from '$lib/server/accounts/account-schema';
import { acceptSetUp, isSetUpOpen } from '$lib/server/accounts/invitations';
import { passwordAdvice } from '$lib/server/accounts/password-choice';
import { hashPassword, MIN_PASSWORD_LENGTH } from '$lib/server/accounts/passwords';
import { startSession } from '$lib/server/accounts/sessions';
import { SET_UP } from '$lib/messages/open';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = async ({ params, setHeaders }) => {
	setHeaders({ 'cache-control': 'no-store' });
	if (!(await isSetUpOpen(params.token))) error(404, SET_UP.gone);
	return { least: MIN_PASSWORD_LENGTH };
};

export const actions: Actions = {
	default: async ({ request, params, cookies, url }) => {
		if (!(await isSetUpOpen(params.token))) error(404, SET_UP.gone);
		const form = await request.formData();
		const password = String(form.get('password') ?? '');
		const [name, email] = [
			accountFields.name.safeParse(form.get('name') ?? ''),
			accountFields.email.safeParse(form.get('email') ?? '')
		];
		const faults = {
			name: name.error?.issues[0]?.message,
			email: email.error?.issues[0]?.message,
			password: passwordAdvice(password)
		};
		if (!name.success || !email.success || faults.password) {
			return fail(422, { faults, name: String(form.get('name') ?? ''), email: String(form.get('email') ?? '') });
		}
		const account = await acceptSetUp(
			params.token,
			{ name: name.data, email: email.data },
			await hashPassword(password)
		);
		if (!account) error(404, SET_UP.gone);
		await startSession(cookies, url, account);
		redirect(303, '/cases');
	}
};
