import { dateTime } from '$lib/messages/format';
import { PERSON_STATES } from '$lib/messages/people';
import type { Person } from '$lib/server/accounts/people';

/** How an account stands, in words; times in the clinic's zone. */
export function personState({ disabled, joined, linkUntil }: Person, zone: string): string {
	if (disabled) return PERSON_STATES.disabled;
	if (joined) return linkUntil ? PERSON_STATES.renewing(dateTime(linkUntil, zone)) : PERSON_STATES.active;
	return linkUntil ? PERSON_STATES.invited(dateTime(linkUntil, zone)) : PERSON_STATES.expired;
}
