import { PASSWORD_FAULTS } from '$lib/messages/open';
import { MAX_PASSWORD_LENGTH, MIN_PASSWORD_LENGTH, passwordFault } from './passwords';

/** What to tell somebody whose new password cannot be taken; null for a good one. */
export function passwordAdvice(password: string): string | null {
	const fault = passwordFault(password);
	if (fault === 'short') return PASSWORD_FAULTS.short(MIN_PASSWORD_LENGTH, [...password].length);
	return fault === 'long' ? PASSWORD_FAULTS.long(MAX_PASSWORD_LENGTH) : null;
}
