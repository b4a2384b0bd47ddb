import type { Effect, Purpose, ResponseClass, Score } from '$lib/mapping/vocabulary';
import type { Verdict } from '$lib/mapping/verdict';

/** The trade's words as they stand on every screen. */

export const KIND_NAMES: Record<Score, string> = {
	intact: 'intact',
	'speech-arrest': 'speech arrest',
	anomia: 'anomia',
	'no-response': 'no response',
	'semantic-paraphasia': 'semantic',
	'phonemic-paraphasia': 'phonemic',
	'unrelated-word': 'unrelated word',
	neologism: 'neologism',
	circumlocution: 'circumlocution',
	perseveration: 'perseveration',
	'syntactic-error': 'syntactic error',
	'repetition-error': 'repetition error',
	'reading-error': 'reading error',
	'completion-error': 'completion error',
	'counting-error': 'counting error',
	'wrong-language': 'wrong language',
	error: 'error, kind later',
	dysarthria: 'dysarthria',
	anarthria: 'anarthria',
	'slow-speech-start': 'slow speech start',
	'negative-motor': 'negative motor response',
	delay: 'delay',
	'self-correction': 'self-correction',
	'not-scorable': 'not scorable',
	afterdischarge: 'afterdischarge',
	seizure: 'seizure',
	'item-not-known': 'item not known',
	'wrong-spot': 'wrong spot',
	inattentive: 'inattentive'
};

/** What each kind means, in one sentence, for those who last scored three months ago. */
export const KIND_MEANINGS: Record<Score, string> = {
	intact: 'The answer or an accepted other one, in time and clear.',
	'speech-arrest': 'Running speech stops with the stimulation and comes back when it ends.',
	anomia: 'The lead-in is said but the word is not found.',
	'no-response': 'Neither the lead-in nor the word, and no other cause is seen.',
	'semantic-paraphasia': 'Another word, related in meaning.',
	'phonemic-paraphasia': 'Sounds are changed; the word is still recognised.',
	'unrelated-word': 'A real word that has nothing to do with the item.',
	neologism: 'Not a word, and little of the right one is kept.',
	circumlocution: 'The patient describes instead of naming.',
	perseveration: 'An earlier answer comes again.',
	'syntactic-error': 'Wrong article, agreement or verb form.',
	'repetition-error': 'What was heard is not said again as it was.',
	'reading-error': 'What stands there is not read as it stands.',
	'completion-error': 'The sentence is not ended with a fitting word.',
	'counting-error': 'The series skips, turns, stops or hurries.',
	'wrong-language': 'Right word, wrong language.',
	error: 'Disturbed; which kind is settled later.',
	dysarthria: 'The word is known but slurred or strained.',
	anarthria: 'The word is known but cannot be spoken at all.',
	'slow-speech-start': 'A long silent start, then normal speech.',
	'negative-motor': 'Tongue or hand movement stops as well.',
	delay: 'Right, but later than is usual for this patient.',
	'self-correction': 'An error, then the right word.',
	'not-scorable': 'Noise, cough or a cut recording.',
	afterdischarge: 'The cortex went on firing after the stimulation.',
	seizure: 'A clinical seizure.',
	'item-not-known': 'The patient does not know this item.',
	'wrong-spot': 'The stimulation was not at this tag.',
	inattentive: 'The patient did not attend.'
};

const TASK_NAMES: Record<string, string> = {
	'object-naming': 'object naming',
	'action-naming': 'action naming',
	counting: 'counting',
	repetition: 'repetition',
	reading: 'reading',
	'sentence-completion': 'sentence completion',
	'naming-from-description': 'naming from description'
};

/** A task of the team's own shows as it is called. */
export function taskName(task: string): string {
	return TASK_NAMES[task] ?? task.replaceAll('-', ' ');
}

/** The name of a language in English, by Unicode's data; the tag itself where there is none. */
export function languageName(tag: string): string {
	return new Intl.DisplayNames(['en'], { type: 'language', fallback: 'code' }).of(tag) ?? tag;
}

export const VERDICT_NAMES: Record<Verdict, string> = {
	untested: 'untested',
	open: 'open',
	positive: 'positive',
	negative: 'negative'
};

export const EFFECT_NAMES: Record<Effect, string> = {
	disturbed: 'disturbed',
	intact: 'intact',
	excluded: 'not counted'
};

export const CLASS_NAMES: Record<ResponseClass, string> = { language: 'language', 'speech-motor': 'speech-motor' };

export const PURPOSE_NAMES: Record<Purpose, string> = {
	baseline: 'baseline',
	ladder: 'finding the current',
	mapping: 'mapping',
	resection: 'resection',
	'follow-up': 'follow-up',
	simulation: 'simulation'
};

/** Cautions that stand wherever the work can hurt somebody. */
export const CAUTIONS = {
	recordsOnly: 'Records only: never controls the stimulator. Not a certified medical device.',
	rule: 'Local protocol and the surgeon decide.',
	seizure:
		'Stop stimulating. Cold saline or Ringer on the cortex. Local seizure protocol; the anaesthetist decides on drugs.',
	afterdischarge: 'Stop, wait about a minute, then lower the current. Errors during an afterdischarge do not count.'
};
