import { z } from 'zod';
import { ROLES, type Role } from './roles';

/** What may be said of an account. Hospital networks have addresses without a top-level domain. */
export const accountFields = {
	name: z.string().trim().min(1, 'Give a name.').max(100, 'At most 100 characters.'),
	email: z
		.string()
		.trim()
		.max(320, 'At most 320 characters.')
		.regex(/^[^\s@]+@[^\s@]+$/, 'Give an e-mail address, name@place.'),
	roles: z
		.array(z.enum(ROLES, `One of ${ROLES.join(', ')}.`))
		.min(1, 'Choose at least one role.')
		.transform((roles): Role[] => ROLES.filter((role) => roles.includes(role)))
};
