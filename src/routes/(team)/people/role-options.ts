import { ROLE_HINTS } from '$lib/messages/people';
import { ROLE_NAMES } from '$lib/messages/team';

export type RoleName = keyof typeof ROLE_NAMES;

/** The roles to choose from, with what each lets somebody do. */
export const ROLE_OPTIONS = (Object.keys(ROLE_NAMES) as RoleName[]).map((value) => ({
	value,
	label: ROLE_NAMES[value],
	hint: ROLE_HINTS[value]
}));
