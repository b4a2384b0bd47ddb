import type { Cookies } from '@sveltejs/kit';
import { isSecure } from '../accounts/sessions';

/** The patient view's own cookie: never the staff's, even in the same browser. */
function cookieName(url: URL): string {
	return isSecure(url) ? '__Host-wordkeep-patient' : 'wordkeep-patient';
}

export function readPatientToken(cookies: Cookies, url: URL): string | null {
	return cookies.get(cookieName(url)) ?? null;
}

const A_DAY = 86_400;

export function writePatientToken(cookies: Cookies, url: URL, token: string): void {
	cookies.set(cookieName(url), token, {
		path: '/',
		httpOnly: true,
		sameSite: 'strict',
		secure: isSecure(url),
		maxAge: A_DAY
	});
}
