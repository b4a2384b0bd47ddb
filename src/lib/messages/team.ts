/** Words round every page behind sign-in, and of one's own account. */

export const ROLE_NAMES = {
	therapist: 'speech therapist',
	examiner: 'examiner',
	neurophysiologist: 'neurophysiologist',
	surgeon: 'surgeon',
	reviewer: 'reviewer',
	administrator: 'administrator'
};

/** Roles in one line: "speech therapist, examiner". */
export function roleList(roles: readonly (keyof typeof ROLE_NAMES)[]): string {
	return roles.map((role) => ROLE_NAMES[role]).join(', ');
}

export const NAVIGATION = {
	label: 'Main',
	toContent: 'Skip to content',
	cases: 'Cases',
	library: 'Library',
	people: 'People',
	account: 'Account',
	signOut: 'Sign out'
};

export const ACCOUNT = {
	title: 'Account',
	lead: (email: string, roles: string) => `You sign in as ${email}. Your roles: ${roles}.`,
	nameTitle: 'Your name',
	name: 'Name',
	nameHint: 'Stands in the case log beside what you entered.',
	nameMissing: 'Give a name of at most 100 characters.',
	saveName: 'Save name',
	nameSaved: 'Your name is saved.',
	passwordTitle: 'Your password',
	current: 'Password now',
	next: 'New password',
	savePassword: 'Change password',
	passwordSaved: 'Your password is changed. Every other screen with this account is signed out.',
	currentWrong: 'This is not your password.',
	wait: (seconds: number) => `Too many wrong passwords. Try again in ${seconds} s.`,
	busy: 'Saving…'
};
