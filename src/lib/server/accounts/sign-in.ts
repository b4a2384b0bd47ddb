import { RateLimiterMemory } from 'rate-limiter-flexible';
import { credentialsOf, normalEmail, type Account } from './accounts';
import { verifyPassword } from './passwords';

/** Wrong passwords for one account from one address before a wait; open sessions are never touched by it. */
const FAILURES = 10;
const WAIT_SECONDS = 60;

const failures = new RateLimiterMemory({ points: FAILURES, duration: WAIT_SECONDS });

export type SignIn =
	{ ok: true; account: Account } | { ok: false; why: 'wrong' } | { ok: false; why: 'wait'; seconds: number };

/** Checks an address and a password. Unknown and wrong look and last the same. */
export async function signIn(email: string, password: string, from: string): Promise<SignIn> {
	const key = `${normalEmail(email)} ${from}`;
	const known = await failures.get(key);
	if (known && known.consumedPoints >= FAILURES) {
		return { ok: false, why: 'wait', seconds: Math.ceil(known.msBeforeNext / 1000) };
	}
	const found = await credentialsOf(email);
	const usable = found && !found.account.disabled ? found : null;
	if (!(await verifyPassword(usable?.passwordHash ?? null, password)) || !usable) {
		await failures.penalty(key);
		return { ok: false, why: 'wrong' };
	}
	await failures.delete(key);
	return { ok: true, account: usable.account };
}
