/**
 * The closed lists of the trade, in the spelling of the case log.
 * Error kinds and classes: definitions after Collée et al., Neurosurg Rev 2023;46:38 (review of 102 papers) and
 * Corina et al., Brain Lang 2010 (PMC3247200), in our own words in the message catalogue.
 */

export const LANGUAGE_KINDS = [
	'speech-arrest',
	'anomia',
	'no-response',
	'semantic-paraphasia',
	'phonemic-paraphasia',
	'unrelated-word',
	'neologism',
	'circumlocution',
	'perseveration',
	'syntactic-error',
	'repetition-error',
	'reading-error',
	'completion-error',
	'counting-error',
	'wrong-language',
	'error'
] as const;
export const SPEECH_MOTOR_KINDS = ['dysarthria', 'anarthria', 'slow-speech-start', 'negative-motor'] as const;
export const OTHER_KINDS = ['delay', 'self-correction'] as const;
export const EXCLUDED_KINDS = [
	'not-scorable',
	'afterdischarge',
	'seizure',
	'item-not-known',
	'wrong-spot',
	'inattentive'
] as const;

export const ERROR_KINDS = [...LANGUAGE_KINDS, ...SPEECH_MOTOR_KINDS, ...OTHER_KINDS, ...EXCLUDED_KINDS] as const;
export type ErrorKind = (typeof ERROR_KINDS)[number];

export const SCORES = ['intact', ...ERROR_KINDS] as const;
export type Score = (typeof SCORES)[number];

/** What a result is asked for: language, or the muscles of speech. */
export const CLASSES = ['language', 'speech-motor'] as const;
export type ResponseClass = (typeof CLASSES)[number];

/** What one trial says about its site. */
export const EFFECTS = ['disturbed', 'intact', 'excluded'] as const;
export type Effect = (typeof EFFECTS)[number];

/** The tasks that come with an item-set format; a team may add its own in kebab case. */
export const TASKS = [
	'object-naming',
	'action-naming',
	'counting',
	'repetition',
	'reading',
	'sentence-completion',
	'naming-from-description'
] as const;

/** Tasks in which the prompt stays and every stimulation is a trial of its own. */
export const RUNNING_TASKS: readonly string[] = ['counting', 'free-speech'];

export const PURPOSES = ['baseline', 'ladder', 'mapping', 'resection', 'follow-up', 'simulation'] as const;
export type Purpose = (typeof PURPOSES)[number];

export const TAG_KINDS = ['cortical', 'subcortical'] as const;
export type TagKind = (typeof TAG_KINDS)[number];

export const HEMISPHERES = ['left', 'right'] as const;
export type Hemisphere = (typeof HEMISPHERES)[number];

/** A tag: a number or letters as laid on the cortex, with a letter added when a number is used again (7B). */
export const TAG_PATTERN = /^[1-9A-Z][0-9A-Z]{0,2}$/;
