import { accountRoom, hub } from './hub';

/**
 * Ends the open streams of accounts whose rights or sessions changed. Their screens come back at once and are asked
 * again, as at any request; without this a stream opened before would go on telling what may no longer be read.
 */
export function endStreamsOf(accounts: Iterable<string>): void {
	for (const id of accounts) hub.passing(accountRoom(id), { name: 'access', data: {} });
}
