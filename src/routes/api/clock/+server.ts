import { json } from '@sveltejs/kit';
import { BOOT, serverNow } from '$lib/server/live/server-clock';
import type { RequestHandler } from './$types';

/** The server's time, for a device that measures how far its own clock is off. */
export const GET: RequestHandler = () => {
	return json({ now: serverNow(), boot: BOOT }, { headers: { 'cache-control': 'no-store' } });
};
