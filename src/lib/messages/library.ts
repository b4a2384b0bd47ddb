/** Words of the library of item sets. */

export const LIBRARY = {
	title: 'Library',
	lead: 'Item sets that come with Wordkeep. A case copies what it uses.',
	caption: 'Item sets',
	search: 'Search title, task, language',
	set: 'Item set',
	task: 'Task',
	language: 'Language',
	items: 'Items',
	licence: 'Licence',
	norms: 'Norms',
	norm: { none: 'none' },
	normsMeaning: {
		none: 'No norms exist for these items: name agreement and familiarity are unknown. A baseline round with the patient tells which items to use.'
	},
	loading: 'Reading the library ...',
	failed: (why: string) => `The library could not be read: ${why}`,
	again: 'Try again',
	emptyTitle: 'The library has no item set',
	emptyText: 'The folder stimuli of this server holds none. Its README says how a set is made.'
};

export const LIBRARY_SET = {
	lead: (count: number, task: string, language: string) => `${count} items for ${task} in ${language}`,
	version: 'Version',
	leadIn: 'Said before the answer',
	noLeadIn: 'nothing',
	licences: 'Licences',
	credits: 'Credits',
	items: 'Items',
	search: 'Search answer, category',
	prompt: 'Prompt',
	answer: 'Answer',
	accepted: 'Also accepted',
	category: 'Category',
	syllables: 'Syllables',
	frequency: 'Zipf frequency',
	licence: 'Licence and credit',
	unknown: 'not known',
	hear: (answer: string) => `Hear ${answer}`,
	picture: (answer: string) => `Picture: ${answer}`
};
