/** Words of a case's home: what to do next, protocol, items, tags, results, details. */

export const PARTS = {
	overview: 'Overview',
	protocol: 'Protocol',
	items: 'Items',
	tags: 'Tags',
	results: 'Results',
	details: 'Details',
	log: 'Case log'
};
export type Part = keyof typeof PARTS;

export const CASE_HOME = {
	parts: 'Parts of the case',
	planned: (date: string) => `planned ${date}`,
	baseline: 'Baseline',
	examiner: 'Examiner view',
	surgeon: 'Surgeon screen',
	olderTitle: 'This page is older than the case log',
	older:
		'The case log holds entries that this page does not know, so it shows no results. Load the page again; if this stays, the server needs the newer Wordkeep.',
	administratorLead: 'You see who is on this case, not what is in it.',
	created: (when: string) => `Made ${when}`
};

export const SAVED = {
	server: 'saved on the server',
	here: (count: number) => `${count} ${count === 1 ? 'entry' : 'entries'} saved here, waiting to be sent`,
	reading: 'reading only',
	opening: 'opening the case log ...',
	notUpToDate: 'the server is not heard: not up to date',
	signedOut: 'You are signed out. What you noted is saved here and is sent once you sign in again on this device.',
	notAllowed: 'The server does not take entries of yours for this case any more. They are saved here.',
	cannotSave: (why: string) => `This device cannot save entries, so nothing can be changed here: ${why}`,
	refused: (count: number) =>
		`The server refused ${count} ${count === 1 ? 'entry' : 'entries'}. ${count === 1 ? 'It is' : 'They are'} kept on this device.`,
	refusedWhy: (why: string) => `refused: ${why}`
};

export const CHANGED = {
	takeBack: 'Take back',
	putBack: 'Put back',
	takenBack: (label: string) => `Taken back: ${label}`,
	fault: (why: string) => `Nothing was changed: ${why}`
};

export const OVERVIEW = {
	title: 'What to do next',
	next: 'next',
	done: 'done',
	steps: { prepare: 'Prepare', baseline: 'Baseline', theatre: 'Theatre', results: 'Results' },
	prepareEmpty: 'Add the item sets this patient is to be tested with, and look through the protocol.',
	prepared: (items: number, required: number) =>
		`${items} items added. ${required === 0 ? 'No task is required yet: any tested task decides.' : `${required} ${required === 1 ? 'task is' : 'tasks are'} required.`}`,
	addItems: 'Add item sets',
	protocol: 'Protocol',
	baselineEmpty: 'Show every item once, without stimulation. An item stays only if it was right in every round.',
	baselineDone: (rounds: number, kept: number, items: number) =>
		`${rounds} ${rounds === 1 ? 'round' : 'rounds'}. ${kept} of ${items} items are kept.`,
	baseline: 'Baseline',
	theatreEmpty: 'Lay the tags, open the examiner view, pair the patient view, and show the surgeon the surgeon screen.',
	theatreDone: (trials: number, tags: number) =>
		`${trials} trials, ${tags} ${tags === 1 ? 'tag' : 'tags'} on the cortex.`,
	layTags: 'Lay tags',
	resultsEmpty: 'They stand here as soon as the first trial is scored.',
	resultsDone: (positive: number, open: number) => `${positive} positive, ${open} still open.`,
	results: 'See the results',
	operation: 'Operation',
	team: 'Team',
	note: 'Note',
	nobody: 'nobody'
};

export const PROTOCOL_PART = {
	lead: 'The rule and the effects hold for every trial of the case, those already scored included. No trial is changed.',
	ruleTitle: 'Rule',
	minTrials: 'Valid trials a site needs',
	minTrialsWrong: 'A whole number from 1 to 20.',
	share: 'Positive from this share of disturbed trials',
	sharePart: 'disturbed trials',
	shareOf: 'of',
	shareTrials: 'trials',
	shareWrong: 'Two whole numbers from 1 to 100, the first no larger than the second: 2 of 3.',
	later: 'An error that comes more than 4 s after the stimulation',
	laterExcluded: 'does not count',
	laterCounted: 'counts as disturbed',
	requiredTitle: 'Required tasks and languages',
	requiredHint:
		'A site is negative only when it is negative in each of these. With none required, every task tested there decides.',
	requiredNone: 'Add item sets first: their tasks can be required then.',
	notPrepared: 'no items yet',
	timingTitle: 'Timing',
	shown: 'Time on the screen, in seconds',
	shownHint: 'Empty: until it is taken off.',
	shownWrong: 'A number of seconds from 0.1 to 600, or empty.',
	pause: 'Pause between stimulations, in seconds',
	pauseHint: 'A reminder, never a stop.',
	pauseWrong: 'A number of seconds from 0 to 600.',
	timeLead: 'Sent ahead, in milliseconds',
	timeLeadHint: 'How long before its time an item goes to the patient view. 100 suits most networks.',
	leadWrong: 'A number of milliseconds from 0 to 2000.',
	kindsTitle: 'Error kinds',
	kindsLead:
		'Those with a key can be scored in one press; any other can be chosen afterwards. The effect is what one such trial says about the site.',
	kind: 'Error kind',
	key: 'Own key',
	keyOf: (kind: string) => `${kind} has a key of its own`,
	effectOf: (kind: string, asked: string) => `Effect of ${kind} for ${asked}`,
	usual: (effect: string) => `${effect} (usual)`,
	save: 'Save the protocol',
	unchanged: 'Nothing is changed.',
	changed: 'Protocol changed',
	discard: 'Discard what I changed',
	otherTitle: 'The protocol was changed meanwhile on another device. Saving here changes only what you changed.',
	faults: 'Nothing is saved yet: see the marked answers.'
};

export const ITEMS_PART = {
	inCase: 'In this case',
	emptyTitle: 'This case has no items yet',
	emptyText:
		'Add item sets from the library below. The case keeps its own copy, so a later version of a set changes nothing here.',
	task: 'Task',
	language: 'Language',
	items: 'Items',
	required: 'Required',
	counts: (kept: number, dropped: number) => (dropped === 0 ? `${kept}` : `${kept} kept, ${dropped} dropped`),
	isRequired: (task: string) => `${task} is required`,
	requiredChanged: (task: string, required: boolean) => `${task} is ${required ? 'required' : 'not required any more'}`,
	remove: 'Remove',
	removeName: (set: string) => `Remove ${set} from the case`,
	removed: (set: string) => `${set} removed from the case`,
	try: 'Try them in a baseline round',
	library: 'Library',
	libraryCaption: 'Item sets of the library',
	librarySearch: 'Search item sets',
	set: 'Item set',
	count: 'Items',
	add: 'Add',
	addName: (set: string) => `Add ${set}`,
	adding: 'Adding ...',
	added: (count: number, set: string) => `${count} items added from ${set}`,
	inCaseAlready: 'in this case',
	newerVersion: (version: string) => `version ${version} in this case`,
	otherLanguages: (count: number) => `Show sets in other languages (${count})`,
	onlyCaseLanguages: 'Only the languages of the case',
	noneInLanguages: 'The library has no set in the languages of this case.',
	loading: 'Reading the library ...',
	failed: (why: string) => `The library could not be read: ${why}`,
	addFailed: (why: string) => `Nothing was added: ${why}`,
	again: 'Try again'
};

export const TAGS_PART = {
	lead: 'A tag on another spot is a new site. A number that is used again gets a letter: 7B.',
	lay: 'Lay tags',
	layHint: 'One tag or several in a row: 1 to 12, or 3, 4, A.',
	layWrong: (faults: string) => `No tag: ${faults}. A tag is one to three digits or letters and does not begin with 0.`,
	layEmpty: 'Write which tags to lay.',
	kind: 'Kind',
	button: 'Lay',
	nextOne: (tag: string) => `Lay tag ${tag}`,
	laid: (tags: string[]) => (tags.length === 1 ? `Tag ${tags[0]} laid` : `${tags.length} tags laid`),
	taken: (tag: string) => `Tag ${tag} is laid already.`,
	wasLaid: (tag: string) => `Tag ${tag} was laid before and taken off.`,
	sameSpot: (tag: string) => `Same spot: lay ${tag} again`,
	newSpot: (tag: string) => `Another spot: lay ${tag}`,
	leaveOut: 'Leave it',
	noName: 'No letter is free for this number: choose another one.',
	onCortex: 'On the cortex',
	takeOff: 'Take off',
	takeOffName: (tag: string) => `Take tag ${tag} off`,
	takenOff: (tag: string) => `Tag ${tag} taken off`,
	emptyTitle: 'No tag is laid yet',
	emptyText: 'Note them as they are laid on the cortex. The examiner can lay one in the run as well.',
	emptyReader: 'They stand here once the team has laid them.',
	off: 'Taken off'
};

export const RESULTS_PART = {
	emptyTitle: 'No site has been stimulated yet',
	emptyText: 'Results stand here as soon as the first trial at a tag is scored.',
	tags: 'Each tag, everything together',
	tag: 'Tag',
	result: 'Result',
	stillOpen: 'Still to do',
	rows: 'Each tag, task and language',
	askedFor: 'Results for',
	task: 'Task',
	language: 'Language',
	disturbed: 'Disturbed',
	interval: '95 % interval',
	current: 'Current',
	kinds: 'Error kinds',
	notCounted: (count: number) => `${count} not counted`,
	search: 'Search tag, task, language',
	controls: 'Errors without stimulation',
	controlsNone: 'No control trial has been scored yet, so the error rate without stimulation is not known.',
	rate: (share: string, low: string, high: string) => `${share} (95 % interval ${low} to ${high})`,
	disturbedOf: (k: number, n: number) => `${k} of ${n} disturbed`,
	of: (k: number, n: number) => `${k} of ${n}`,
	trialsCsv: 'Trials (CSV)',
	sitesCsv: 'Sites (CSV)',
	settled: (result: string) => `will be ${result}`
};

export const DETAILS_PART = {
	title: 'Operation',
	save: 'Save the details',
	changed: 'Details changed',
	unchanged: 'Nothing is changed.',
	team: 'Team',
	teamSave: 'Save the team',
	teamChanged: 'Team changed',
	teamOnly: 'An administrator changes the team.',
	failed: (why: string) => `Nothing was saved: ${why}`
};
