/** Words of the pages that need no account. */

export const WELCOME = {
	claim: 'Language testing in awake brain surgery, tag by tag.',
	caution:
		'Wordkeep records and computes. It does not control a stimulator and is not a certified medical device: local protocols and the licensed clinician decide.'
};

export const PASSWORD_RULE = (least: number) =>
	`At least ${least} characters. Several words in a row are easy to keep in mind.`;

export const PASSWORD_FAULTS = {
	short: (least: number, given: number) => `${least} characters at least; these are ${given}.`,
	long: (most: number) => `At most ${most} characters.`
};

export const FIELDS = {
	name: 'Name',
	nameHint: 'As your colleagues know you.',
	email: 'E-mail address',
	password: 'Password',
	newPassword: 'New password'
};

export const SIGN_IN = {
	title: 'Sign in',
	submit: 'Sign in',
	busy: 'Signing in…',
	wrong: 'The e-mail address or the password is wrong.',
	wait: (seconds: number) => `Too many wrong passwords. Try again in ${seconds} s. Screens that are open go on.`,
	forgotten: 'No account yet, or password forgotten? An administrator gives you a one-time link.'
};

export const INVITATION = {
	title: (name: string) => `Welcome, ${name}`,
	lead: (email: string) => `Choose a password. You sign in with it and ${email}.`,
	again: 'New password',
	againLead: (email: string) => `Choose a new password for ${email}. Other screens with this account are signed out.`,
	submit: 'Save and sign in',
	busy: 'Saving…',
	gone: 'This link was used already, or is too old. Ask an administrator for a new one.'
};

export const SET_UP = {
	title: 'First administrator',
	lead: 'Nobody has an account on this server yet. The first one makes the accounts of the others.',
	submit: 'Make the account',
	busy: 'Making it…',
	gone: 'This link does not work any more. While nobody has an account, the server prints a new one at each start.'
};

export const TROUBLE = {
	lost: 'There is no such page',
	lostDetail: 'Perhaps the address was cut off. Nothing was changed.',
	failed: 'Something went wrong on the server',
	failedDetail: 'What you had saved is kept. Try again; if it stays so, tell whoever runs the server.',
	reference: (id: string) => `Reference ${id}`,
	home: 'Go to your cases'
};
