import { fail } from '@sveltejs/kit';
import { accountFields } from '$lib/server/accounts/account-schema';
import { changeAccount, setPassword } from '$lib/server/accounts/accounts';
import { passwordAdvice } from '$lib/server/accounts/password-choice';
import { hashPassword, MIN_PASSWORD_LENGTH } from '$lib/server/accounts/passwords';
import { startSession } from '$lib/server/accounts/sessions';
import { signIn } from '$lib/server/accounts/sign-in';
import { ACCOUNT } from '$lib/messages/team';
import type { Actions, PageServerLoad } from './$types';

export const load: PageServerLoad = () => ({ least: MIN_PASSWORD_LENGTH });

export const actions: Actions = {
	name: async ({ request, locals }) => {
		const given = String((await request.formData()).get('name') ?? '');
		const name = accountFields.name.safeParse(given);
		if (!name.success) return fail(422, { name: given, nameFault: ACCOUNT.nameMissing });
		await changeAccount(locals.account!.id, { name: name.data });
		return { saved: 'name' as const };
	},
	password: async ({ request, locals, cookies, url, getClientAddress }) => {
		const form = await request.formData();
		const next = String(form.get('next') ?? '');
		const nextFault = passwordAdvice(next);
		if (nextFault) return fail(422, { nextFault });
		const account = locals.account!;
		const known = await signIn(account.email, String(form.get('current') ?? ''), getClientAddress());
		if (!known.ok && known.why === 'wait') return fail(429, { currentFault: ACCOUNT.wait(known.seconds) });
		if (!known.ok) return fail(422, { currentFault: ACCOUNT.currentWrong });
		await setPassword(account.id, await hashPassword(next));
		await startSession(cookies, url, account);
		return { saved: 'password' as const };
	}
};
