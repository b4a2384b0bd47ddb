/** Words of the page where an administrator looks after accounts and the clinic's settings. */

export const PEOPLE = {
	title: 'People',
	lead: 'Everybody who may sign in. What somebody may do follows from their roles, and in a case from being on its team.',
	add: 'Add somebody',
	caption: 'Accounts',
	search: 'Search name, address or role',
	columns: { name: 'Name', roles: 'Roles', state: 'State', change: 'Change' },
	you: 'you',
	change: 'Change',
	changeWhom: (name: string) => `Change ${name}`,
	unread: 'The list could not be read.',
	again: 'Try again'
};

export const PERSON_STATES = {
	active: 'active',
	disabled: 'disabled',
	invited: (until: string) => `link open until ${until}`,
	expired: 'never joined, link too old',
	renewing: (until: string) => `active, new link until ${until}`
};

export const PERSON_FORM = {
	name: 'Name',
	nameHint: 'As colleagues know them; stands in the case log.',
	email: 'E-mail address',
	emailHint: 'They sign in with it. It cannot be changed afterwards.',
	roles: 'Roles',
	add: 'Add and make a link',
	save: 'Save',
	busy: 'Saving…'
};

/** What a role lets somebody do, in the cases they are on the team of. */
export const ROLE_HINTS = {
	therapist: 'prepares cases, runs baselines and trials',
	examiner: 'runs and scores trials',
	neurophysiologist: 'current, afterdischarges, entries in the case log',
	surgeon: 'sees the results, live',
	reviewer: 'reads finished cases',
	administrator: 'accounts, teams, settings; no case content'
};

export const LINK = {
	title: 'One-time link',
	what: (name: string, until: string) =>
		`Hand this link to ${name}. It works once, until ${until}, and is shown only now.`,
	label: (name: string) => `One-time link for ${name}`,
	done: 'Done'
};

export const ACCESS = {
	title: 'Access',
	renew: 'New one-time link',
	renewHint:
		'For a lost link or a forgotten password. Links made before stop working; the password now holds until then.',
	disable: 'Disable account',
	disableHint: 'Signs them out at once. Their entries stay in the case logs. It can be enabled again.',
	enable: 'Enable account',
	enableHint: 'They can sign in again with the password they had.'
};

export const CLINIC = {
	title: 'Clinic',
	zone: 'Time zone',
	zoneHint: 'All times on all screens are shown in it.',
	nowThere: (time: string) => `Now: ${time}`,
	save: 'Save time zone',
	saved: 'The time zone is saved.'
};
