import type { Score } from '$lib/mapping/vocabulary';

/**
 * The invented scenario of the demo. Nobody in it exists and nothing in it happened: it was made up to show every kind
 * of result on one screen.
 */

/** One trial at a tag, or a control without one. */
export interface ScriptedTrial {
	tag: string | null;
	set: string;
	score: Score;
	also?: Score[];
	said?: string;
	milliamps?: number;
}

const OBJECTS = 'objects-en';

function site(tag: string, milliamps: number, scores: Score[], set = OBJECTS): ScriptedTrial[] {
	return scores.map((score) => ({ tag, set, score, milliamps }));
}

const FINISHED_SITES: ScriptedTrial[][] = [
	site('1', 2.5, ['intact', 'intact', 'intact']),
	site('2', 3, ['intact', 'semantic-paraphasia', 'intact']),
	site('3', 3, ['intact', 'intact', 'intact']),
	site('4', 3, ['anomia', 'intact', 'anomia']),
	site('5', 3, ['semantic-paraphasia', 'phonemic-paraphasia', 'intact']),
	site('6', 3, ['intact', 'intact', 'delay']),
	site('7', 3, ['intact', 'afterdischarge', 'intact', 'intact']),
	site('8', 3, ['dysarthria', 'dysarthria', 'intact']),
	site('9', 3, ['speech-arrest', 'speech-arrest', 'speech-arrest'], 'series-en'),
	site('10', 3, ['intact', 'intact']),
	site('4', 3, ['intact', 'intact', 'intact'], 'objects-de'),
	site('5', 3, ['intact', 'wrong-language', 'intact'], 'objects-de')
];

/** Tag by tag and never the same one twice running; every third trial is a control. */
export function finishedTrials(): ScriptedTrial[] {
	const rounds = Math.max(...FINISHED_SITES.map((trials) => trials.length));
	const stimulated = Array.from({ length: rounds }, (_, round) =>
		FINISHED_SITES.flatMap((trials) => trials[round] ?? [])
	);
	return stimulated
		.flat()
		.flatMap((trial, index) =>
			index % 3 === 2
				? [trial, { tag: null, set: OBJECTS, score: index === 17 ? 'self-correction' : 'intact' }]
				: [trial]
		);
}

export const FINISHED = {
	hemisphere: 'left' as const,
	languages: ['en', 'de'],
	plannedOn: '2026-05-04',
	note: 'Invented for the demo: no such patient exists and nothing here happened.',
	tags: ['1', '2', '3', '4', '5', '6', '7', '8', '9', '10'],
	sets: [OBJECTS, 'objects-de', 'series-en'],
	/** the invented operation, in UTC */
	begins: '2026-05-04T09:12:00.000Z',
	/** from one trial to the next, in milliseconds */
	every: 21_000
};

export const PREPARED = {
	hemisphere: 'left' as const,
	languages: ['en', 'de'],
	plannedOn: '2026-12-15',
	note: 'Invented for the demo: a case ready for its first trial.',
	tags: ['1', '2', '3', '4', '5', '6', '7', '8', '9', '10', '11', '12'],
	sets: [OBJECTS, 'actions-en', 'series-en', 'repetition-en', 'objects-de']
};

export const PEOPLE = [
	{ name: 'Demo Therapist', role: 'therapist' },
	{ name: 'Demo Examiner', role: 'examiner' },
	{ name: 'Demo Neurophysiologist', role: 'neurophysiologist' },
	{ name: 'Demo Surgeon', role: 'surgeon' },
	{ name: 'Demo Reviewer', role: 'reviewer' },
	{ name: 'Demo Administrator', role: 'administrator' }
] as const;
