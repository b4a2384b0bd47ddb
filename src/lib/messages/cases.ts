import type { Hemisphere, TagKind } from '$lib/mapping/vocabulary';

/** Words of the list of cases, of a new case, and of what a case says of its operation. */

export const HEMISPHERE_NAMES: Record<Hemisphere, string> = { left: 'left hemisphere', right: 'right hemisphere' };
export const TAG_KIND_NAMES: Record<TagKind, string> = { cortical: 'cortical', subcortical: 'subcortical' };

export const CASES = {
	title: 'Cases',
	lead: 'One case is one operation, under a code that carries no name.',
	leadAdministrator: 'You see who is on a case, not what is in it. On your own cases you see everything.',
	add: 'New case',
	search: 'Search code, person, language',
	caption: 'Cases',
	code: 'Code',
	operation: 'Operation',
	planned: 'Planned',
	team: 'Team',
	noTeam: 'nobody',
	notPlanned: 'no date yet',
	notShown: 'seen by its team only',
	loading: 'Reading the cases ...',
	failed: (why: string) => `The cases could not be read: ${why}`,
	again: 'Try again',
	emptyTitle: 'There is no case yet',
	emptyCreate: 'Make one when an operation is planned: side, languages and team are enough to begin.',
	emptyJoin: 'You will see a case here once you are on its team. An administrator can add you.'
};

export const CASE_FORM = {
	title: 'New case',
	lead: 'Wordkeep gives the case a code. Which patient it is stays in your own records.',
	hemisphere: 'Side of the operation',
	hemisphereMissing: 'Choose the side.',
	languages: 'Languages to be tested',
	languagesHint: 'Type a name, such as German, or a tag, such as de-AT. Choose as many as the patient speaks.',
	languagesMissing: 'Choose at least one language.',
	planned: 'Planned date',
	plannedHint: 'It can be left empty.',
	team: 'Team',
	teamHint: 'Only these people see what is in the case. You are on it.',
	teamHintAdministrator: 'Only these people see what is in the case.',
	teamFailed: (why: string) => `The people could not be read: ${why}`,
	note: 'Note',
	noteHint: 'For the team. No names, no birth dates, no record numbers.',
	create: 'Make the case',
	creating: 'Making the case ...',
	failed: (why: string) => `The case was not made: ${why} What you entered is still here.`,
	cancel: 'Back to the cases'
};

export const LANGUAGE_PICKER = {
	add: 'Add a language',
	remove: (name: string) => `Remove ${name}`,
	none: (text: string) => `No language is called "${text}".`,
	chosen: 'Chosen languages',
	list: 'Languages'
};
