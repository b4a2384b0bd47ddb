import type { Account } from './accounts/accounts';
import { APPENDERS, READERS, type Role } from './accounts/roles';
import { isOnTeam, type Case } from './cases/cases';

/** Who may use a route with a method. */
export interface Access {
	/** `anyone` needs no account; `patient-view` is a paired screen and never an account */
	who: 'anyone' | 'patient-view' | 'signed-in' | readonly Role[];
	/** for routes of one case: on its team only, or administrators as well */
	case?: 'team' | 'team-or-administrator';
}

export type Method = 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE';

const ANYONE: Access = { who: 'anyone' };
const SIGNED_IN: Access = { who: 'signed-in' };
const ADMINISTRATOR: Access = { who: ['administrator'] };
const PATIENT_VIEW: Access = { who: 'patient-view' };
const READ_CASE: Access = { who: READERS, case: 'team' };
const APPEND_CASE: Access = { who: APPENDERS, case: 'team' };

/**
 * The one table of permissions: the framework's route id, the method, who. A route that is not in it is refused to
 * everybody. Pages answer GET and, where they have form actions, POST.
 */
export const PERMISSIONS: Readonly<Record<string, Partial<Record<Method, Access>>>> = {
	'/': { GET: SIGNED_IN },
	'/(open)/sign-in': { GET: ANYONE, POST: ANYONE },
	'/(open)/invitation/[token]': { GET: ANYONE, POST: ANYONE },
	'/(open)/set-up/[token]': { GET: ANYONE, POST: ANYONE },
	'/(team)/account': { GET: SIGNED_IN, POST: SIGNED_IN },
	'/(team)/cases': { GET: SIGNED_IN },
	'/(team)/cases/new': { GET: { who: APPENDERS } },
	'/(team)/cases/[code]': { GET: { who: [...READERS, 'administrator'], case: 'team-or-administrator' } },
	'/(team)/cases/[code]/baseline': { GET: APPEND_CASE },
	'/(team)/cases/[code]/examiner': { GET: APPEND_CASE },
	'/(team)/cases/[code]/surgeon': { GET: READ_CASE },
	'/(team)/library': { GET: SIGNED_IN },
	'/(team)/library/[set]': { GET: SIGNED_IN },
	'/(team)/people': { GET: ADMINISTRATOR },
	'/patient': { GET: ANYONE },
	'/media/[file]': { GET: ANYONE },
	'/api/sign-in': { POST: ANYONE },
	'/api/sign-out': { POST: SIGNED_IN },
	'/api/clock': { GET: ANYONE },
	'/api/people': { GET: ADMINISTRATOR, POST: ADMINISTRATOR },
	'/api/people/[id]': { PATCH: ADMINISTRATOR },
	'/api/people/[id]/invitation': { POST: ADMINISTRATOR },
	'/api/settings': { GET: SIGNED_IN, PATCH: ADMINISTRATOR },
	'/api/library': { GET: SIGNED_IN },
	'/api/library/[set]': { GET: SIGNED_IN },
	'/api/team-candidates': { GET: { who: [...APPENDERS, 'administrator'] } },
	'/api/cases': { GET: SIGNED_IN, POST: { who: APPENDERS } },
	'/api/cases/[code]': {
		GET: { who: [...READERS, 'administrator'], case: 'team-or-administrator' },
		PATCH: APPEND_CASE
	},
	'/api/cases/[code]/team': { PUT: { who: ['administrator'], case: 'team-or-administrator' } },
	'/api/cases/[code]/events': { GET: READ_CASE, POST: APPEND_CASE },
	'/api/cases/[code]/stream': { GET: READ_CASE },
	'/api/cases/[code]/map': { GET: READ_CASE },
	'/api/cases/[code]/exports/trials.csv': { GET: READ_CASE },
	'/api/cases/[code]/exports/sites.csv': { GET: READ_CASE },
	'/api/cases/[code]/presence': { POST: APPEND_CASE },
	'/api/cases/[code]/display': { POST: APPEND_CASE },
	'/api/cases/[code]/patient-view': { GET: APPEND_CASE, POST: APPEND_CASE, PUT: APPEND_CASE, DELETE: APPEND_CASE },
	'/api/patient/pairing': { GET: ANYONE, POST: ANYONE },
	'/api/patient/items': { GET: PATIENT_VIEW },
	'/api/patient/stream': { GET: PATIENT_VIEW },
	'/api/patient/events': { POST: PATIENT_VIEW },
	'/api/patient/presence': { POST: PATIENT_VIEW }
};

export type Decision = 'allowed' | 'sign-in-first' | 'forbidden' | 'not-found';

/**
 * Whether somebody may do something. A case that does not exist and one whose team one is not on look the same, and
 * are answered before the question of roles.
 *
 * @param found the case the route is about: undefined when it is about none, null when there is no such case
 */
export function decide(
	access: Access | undefined,
	account: Account | null,
	patientView: unknown,
	found: Case | null | undefined
): Decision {
	if (!access) return account ? 'forbidden' : 'sign-in-first';
	if (access.who === 'anyone') return 'allowed';
	if (access.who === 'patient-view') return patientView ? 'allowed' : 'sign-in-first';
	if (!account) return 'sign-in-first';
	if (access.case && !(found && mayKnowOf(access.case, found, account))) return 'not-found';
	if (access.who === 'signed-in') return 'allowed';
	return account.roles.some((role) => (access.who as readonly Role[]).includes(role)) ? 'allowed' : 'forbidden';
}

function mayKnowOf(who: 'team' | 'team-or-administrator', found: Case, account: Account): boolean {
	return isOnTeam(found, account) || (who === 'team-or-administrator' && account.roles.includes('administrator'));
}
