import type { Cookies } from '@sveltejs/kit';
import { Lucia, TimeSpan } from 'lucia';
import { db } from '../database';
import { endStreamsOf } from '$lib/server/live/access';
import type { Account } from './accounts';
import { SessionAdapter } from './session-adapter';

/**
 * A session lasts a day after its last use: it must outlast the longest operation, since a run is never stopped by
 * signing in again. The cookie is written here and not by lucia, because its name depends on the connection.
 */
const lucia = new Lucia(new SessionAdapter(db), {
	sessionExpiresIn: new TimeSpan(1, 'd'),
	getUserAttributes: ({ account }) => ({ account })
});

declare module 'lucia' {
	interface Register {
		Lucia: typeof lucia;
		DatabaseUserAttributes: { account: Account };
	}
}

/** `__Host-` cookies need https; in a hospital network without it the plain name is used. */
function cookieName(url: URL): string {
	return isSecure(url) ? '__Host-wordkeep' : 'wordkeep';
}

export function isSecure(url: URL): boolean {
	return url.protocol === 'https:';
}

/** Who is signed in, and prolongs the session when it is half used up. */
export async function readSession(
	cookies: Cookies,
	url: URL
): Promise<{ account: Account; session: string } | { account: null; session: null }> {
	const id = cookies.get(cookieName(url));
	if (!id) return { account: null, session: null };
	const { session, user } = await lucia.validateSession(id);
	if (!session || user.account.disabled) return { account: null, session: null };
	if (session.fresh) writeCookie(cookies, url, session.id);
	return { account: user.account, session: session.id };
}

export async function startSession(cookies: Cookies, url: URL, account: Account): Promise<void> {
	const session = await lucia.createSession(account.id, {});
	writeCookie(cookies, url, session.id);
}

/** Ends the session of a request, where it has one, and the streams that it opened. */
export async function endSession(
	cookies: Cookies,
	url: URL,
	{ account, session }: { account: Account | null; session: string | null }
): Promise<void> {
	if (!account || !session) return;
	await lucia.invalidateSession(session);
	endStreamsOf([account.id]);
	cookies.delete(cookieName(url), { path: '/', secure: isSecure(url) });
}

const A_DAY = 86_400;

function writeCookie(cookies: Cookies, url: URL, value: string): void {
	cookies.set(cookieName(url), value, {
		path: '/',
		httpOnly: true,
		sameSite: 'lax',
		secure: isSecure(url),
		maxAge: A_DAY
	});
}
