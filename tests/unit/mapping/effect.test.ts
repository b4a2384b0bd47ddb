import { describe, expect, it } from 'vitest';
import { effect, type EffectProtocol, type Scored } from '$lib/mapping/effect';
import { CLASSES, SCORES, type Effect, type ResponseClass, type Score } from '$lib/mapping/vocabulary';

type Row = [rule: string, kinds: Score[], language: Effect, speechMotor: Effect];

const BY_KIND: Row[] = [
	['intact is intact', ['intact'], 'intact', 'intact'],
	[
		'language: language kinds are disturbed; speech-motor: the rest intact',
		[
			'anomia',
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
		],
		'disturbed',
		'intact'
	],
	[
		'language: language kinds are disturbed; speech-motor: speech arrest and no response are excluded',
		['speech-arrest', 'no-response'],
		'disturbed',
		'excluded'
	],
	[
		'language: dysarthria, slow speech start are intact unless the protocol counts them; speech-motor kinds are disturbed',
		['dysarthria', 'slow-speech-start'],
		'intact',
		'disturbed'
	],
	[
		'language: anarthria and negative motor response are excluded; speech-motor kinds are disturbed',
		['anarthria', 'negative-motor'],
		'excluded',
		'disturbed'
	],
	[
		'language: delay and self-correction are intact unless the protocol counts them; speech-motor: the rest intact',
		['delay', 'self-correction'],
		'intact',
		'intact'
	],
	[
		'kinds of the class "excluded" are excluded in both',
		['not-scorable', 'afterdischarge', 'seizure', 'item-not-known', 'wrong-spot', 'inattentive'],
		'excluded',
		'excluded'
	]
];

describe('what one kind says, by class', () => {
	const rows = BY_KIND.flatMap(([rule, kinds, language, speechMotor]) =>
		kinds.map((kind) => [kind, language, speechMotor, rule] as const)
	);

	it.each(rows)('%s: language %s, speech-motor %s (%s)', (kind, language, speechMotor) => {
		expect(effect(kind)).toBe(language);
		expect(effect(kind, { class: 'language' })).toBe(language);
		expect(effect(kind, { class: 'speech-motor' })).toBe(speechMotor);
		expect(effect({ score: kind }, { class: 'speech-motor' })).toBe(speechMotor);
	});

	it('leaves no kind out', () => {
		expect(rows.map(([kind]) => kind).sort()).toEqual([...SCORES].sort());
	});

	it('refuses a kind that is not in the list, also beside another', () => {
		expect(() => effect('mumbling' as Score)).toThrow(new RangeError('unknown score: mumbling'));
		expect(() => effect({ score: 'anomia', also: ['mumbling' as Score] })).toThrow(RangeError);
	});
});

describe('several kinds in one trial', () => {
	const ORDER = 'an excluded kind wins, then disturbed, then excluded-for-this-class, then intact';
	it.each<[kinds: [Score, ...Score[]], language: Effect, speechMotor: Effect]>([
		[['anomia', 'seizure'], 'excluded', 'excluded'],
		[['dysarthria', 'not-scorable'], 'excluded', 'excluded'],
		[['anarthria', 'afterdischarge', 'anomia'], 'excluded', 'excluded'],
		[['anomia', 'anarthria'], 'disturbed', 'disturbed'],
		[['speech-arrest', 'dysarthria'], 'disturbed', 'disturbed'],
		[['no-response', 'semantic-paraphasia'], 'disturbed', 'excluded'],
		[['anarthria', 'dysarthria'], 'excluded', 'disturbed'],
		[['negative-motor', 'delay'], 'excluded', 'disturbed'],
		[['speech-arrest', 'delay'], 'disturbed', 'excluded'],
		[['delay', 'self-correction'], 'intact', 'intact'],
		[['delay', 'dysarthria'], 'intact', 'disturbed']
	])(`%j: language %s, speech-motor %s (${ORDER})`, (kinds, language, speechMotor) => {
		// Whichever of them was keyed first.
		for (const [index, score] of kinds.entries()) {
			const also = kinds.filter((_, other) => other !== index);
			expect(effect({ score, also })).toBe(language);
			expect(effect({ score, also }, { class: 'speech-motor' })).toBe(speechMotor);
		}
	});
});

describe('an error that came later', () => {
	const LATER = 'an error more than 4 s after the stimulation ended excludes an otherwise disturbed trial';
	it.each<[scored: Scored, asked: ResponseClass, excludedLater: Effect, countedLater: Effect, rule: string]>([
		[{ score: 'anomia', when: 'later' }, 'language', 'excluded', 'disturbed', LATER],
		[{ score: 'dysarthria', when: 'later' }, 'speech-motor', 'excluded', 'disturbed', LATER],
		[{ score: 'delay', also: ['anomia'], when: 'later' }, 'language', 'excluded', 'disturbed', LATER],
		[{ score: 'anomia', when: 'later' }, 'speech-motor', 'intact', 'intact', 'not disturbed: stays intact'],
		[{ score: 'intact', when: 'later' }, 'language', 'intact', 'intact', 'not disturbed: stays intact'],
		[{ score: 'delay', when: 'later' }, 'language', 'intact', 'intact', 'not disturbed: stays intact'],
		[{ score: 'seizure', when: 'later' }, 'language', 'excluded', 'excluded', 'an excluded kind wins'],
		[{ score: 'anomia', when: 'within-4s' }, 'language', 'disturbed', 'disturbed', 'not more than 4 s'],
		[{ score: 'anomia', when: 'during' }, 'language', 'disturbed', 'disturbed', 'not more than 4 s'],
		[{ score: 'anomia' }, 'language', 'disturbed', 'disturbed', 'nothing said of the time']
	])('%j, %s: %s, or %s when the protocol counts it (%s)', (scored, asked, excludedLater, countedLater) => {
		expect(effect(scored, { class: asked })).toBe(excludedLater);
		expect(effect(scored, { class: asked, protocol: { later: 'excluded' } })).toBe(excludedLater);
		expect(effect(scored, { class: asked, protocol: { later: 'counted' } })).toBe(countedLater);
	});
});

describe('a lost movement', () => {
	const LOST = 'a lost movement excludes for language whatever the kinds, and means nothing to speech-motor';
	it.each<[scored: Scored, language: Effect, speechMotor: Effect]>([
		[{ score: 'intact', movement: { tongue: 'lost' } }, 'excluded', 'intact'],
		[{ score: 'anomia', movement: { hand: 'lost' } }, 'excluded', 'intact'],
		[{ score: 'anomia', movement: { tongue: 'kept', hand: 'lost' } }, 'excluded', 'intact'],
		[{ score: 'dysarthria', movement: { tongue: 'lost' } }, 'excluded', 'disturbed'],
		[{ score: 'speech-arrest', movement: { tongue: 'lost' } }, 'excluded', 'excluded'],
		[{ score: 'anomia', movement: { tongue: 'kept', hand: 'kept' } }, 'disturbed', 'intact'],
		[{ score: 'anomia', movement: {} }, 'disturbed', 'intact']
	])(`%j: language %s, speech-motor %s (${LOST})`, (scored, language, speechMotor) => {
		expect(effect(scored)).toBe(language);
		expect(effect(scored, { class: 'speech-motor' })).toBe(speechMotor);
	});

	it('excludes for language whatever the protocol counts', () => {
		const protocol: EffectProtocol = { later: 'counted', effects: { anomia: { language: 'disturbed' } } };
		expect(effect({ score: 'anomia', when: 'later', movement: { tongue: 'lost' } }, { protocol })).toBe('excluded');
	});
});

describe('a protocol that says otherwise', () => {
	it.each<[kind: Score, asked: ResponseClass, to: Effect]>([
		['delay', 'language', 'disturbed'],
		['self-correction', 'language', 'disturbed'],
		['dysarthria', 'language', 'disturbed'],
		['slow-speech-start', 'language', 'disturbed'],
		['anarthria', 'language', 'disturbed'],
		['perseveration', 'language', 'intact'],
		['wrong-language', 'language', 'excluded'],
		['speech-arrest', 'speech-motor', 'disturbed'],
		['inattentive', 'language', 'intact']
	])('%s for %s is %s, and nothing else changes', (kind, asked, to) => {
		const protocol: EffectProtocol = { effects: { [kind]: { [asked]: to } } };
		expect(effect(kind, { class: asked })).not.toBe(to);
		for (const other of SCORES) {
			for (const someClass of CLASSES) {
				const wanted = other === kind && someClass === asked ? to : effect(other, { class: someClass });
				expect(effect(other, { protocol, class: someClass })).toBe(wanted);
			}
		}
	});

	it('counts a kind for both classes when it names both', () => {
		const protocol: EffectProtocol = { effects: { delay: { language: 'disturbed', 'speech-motor': 'disturbed' } } };
		for (const asked of CLASSES) expect(effect('delay', { protocol, class: asked })).toBe('disturbed');
	});

	it('excludes a delay it counts, when it came later', () => {
		const protocol: EffectProtocol = { effects: { delay: { language: 'disturbed' } } };
		expect(effect({ score: 'delay', when: 'later' }, { protocol })).toBe('excluded');
	});
});
