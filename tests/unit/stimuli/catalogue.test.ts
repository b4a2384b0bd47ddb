import { describe, expect, it } from 'vitest';
import { catalogueSet, copyForCase } from '../../../src/lib/stimuli/catalogue';
import type { ItemSet, SetItem } from '../../../src/lib/stimuli/schema';

const item = (changed: Partial<SetItem>): SetItem => ({
	id: 'obj-dog',
	answer: 'dog',
	accepted: ['hound'],
	text: null,
	picture: null,
	spoken: null,
	sound: null,
	licence: 'CC0-1.0',
	attribution: null,
	category: null,
	syllables: null,
	zipf: null,
	note: null,
	...changed
});

const set: ItemSet = {
	id: 'my-set',
	version: '1.2.3',
	title: 'Mine',
	description: 'A set for a test.',
	task: 'object-naming',
	language: 'en',
	leadIn: 'This is a',
	norms: 'none',
	licences: [{ name: 'CC0-1.0', title: 'Creative Commons Zero 1.0' }],
	items: [
		item({ picture: 'media/dog.svg', attribution: 'A. Painter', category: 'animal', syllables: 1, zipf: 5.285 }),
		item({ id: 'obj-owl', answer: 'owl', accepted: [], text: 'It hoots', spoken: 'It hoots', sound: 'flite:rms' }),
		item({ id: 'obj-cat', answer: 'cat', picture: 'media/cat.svg', attribution: 'A. Painter' })
	]
};

const built = catalogueSet(set, {
	picture: (reference) => [{ file: `small of ${reference}`, width: 384 }],
	sound: (voice, spoken) => ({ file: `${spoken} by ${voice}`, duration: 0.8 })
});

describe('catalogueSet', () => {
	it('turns references into prompts and keeps what a therapist chooses by', () => {
		expect(built.items[0]).toEqual({
			id: 'obj-dog',
			answer: 'dog',
			accepted: ['hound'],
			prompts: [
				{ kind: 'picture', files: [{ file: 'small of media/dog.svg', width: 384 }], attribution: 'A. Painter' }
			],
			category: 'animal',
			syllables: 1,
			zipf: 5.285,
			licence: 'CC0-1.0',
			attribution: 'A. Painter',
			note: null
		});
		expect(built.items[1]?.prompts).toEqual([
			{ kind: 'text', text: 'It hoots' },
			{ kind: 'sound', file: 'It hoots by flite:rms', duration: 0.8 }
		]);
	});

	it('lists every credit once', () => {
		expect(built.attribution).toEqual(['A. Painter']);
	});
});

describe('copyForCase', () => {
	it('copies the chosen items in the order of the set, without what only the library needs', () => {
		expect(copyForCase(built, ['obj-cat', 'obj-dog'])).toEqual({
			set: 'my-set',
			version: '1.2.3',
			task: 'object-naming',
			language: 'en',
			leadIn: 'This is a',
			items: [
				{ id: 'obj-dog', answer: 'dog', accepted: ['hound'], prompts: built.items[0]?.prompts, category: 'animal' },
				{ id: 'obj-cat', answer: 'cat', accepted: ['hound'], prompts: built.items[2]?.prompts }
			]
		});
	});

	it('copies the whole set when nothing is chosen, and refuses an item the set does not have', () => {
		expect(copyForCase(built).items.map(({ id }) => id)).toEqual(['obj-dog', 'obj-owl', 'obj-cat']);
		expect(() => copyForCase(built, ['obj-dog', 'obj-emu'])).toThrow('my-set has no item obj-emu');
	});
});
