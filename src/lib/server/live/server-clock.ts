import { randomUUID } from 'node:crypto';

/** Names this run of the server: after a restart readers measure its clock anew. */
export const BOOT = randomUUID();

/** Milliseconds since the epoch by a clock that is never set back while the server runs. */
export function serverNow(): number {
	return performance.timeOrigin + performance.now();
}
