import { describe, expect, it } from 'vitest';
import { TASKS } from '../../../src/lib/mapping/vocabulary';
import { shippedSet, shippedSets } from './shipped-sets';

const having = (id: string, category: string) => shippedSet(id).items.filter((item) => item.category === category);

describe('the sets that come with Wordkeep', () => {
	it('are large enough for a mapping of each task', () => {
		expect(shippedSet('objects-en').items.length).toBeGreaterThanOrEqual(100);
		expect(shippedSet('objects-de').items.length).toBeGreaterThanOrEqual(100);
		expect(shippedSet('actions-en').items.length).toBeGreaterThanOrEqual(30);
		expect(shippedSet('series-en').items.length).toBeGreaterThanOrEqual(5);
		expect(shippedSet('series-de').items.length).toBeGreaterThanOrEqual(5);
		expect(having('repetition-en', 'word').length).toBeGreaterThanOrEqual(40);
		expect(having('repetition-en', 'sentence').length).toBeGreaterThanOrEqual(20);
		expect(shippedSet('reading-en').items.length).toBeGreaterThanOrEqual(40);
		expect(shippedSet('completion-en').items.length).toBeGreaterThanOrEqual(40);
	});

	it('ask the kind of prompt that their task needs', () => {
		const kind: Record<string, 'picture' | 'text' | 'sound'> = {
			'object-naming': 'picture',
			'action-naming': 'picture',
			counting: 'text',
			repetition: 'sound',
			reading: 'text',
			'sentence-completion': 'text'
		};
		for (const set of shippedSets) {
			expect(TASKS as readonly string[]).toContain(set.task);
			const column = kind[set.task];
			expect(column, set.task).toBeDefined();
			expect(set.items.filter((item) => item[column ?? 'text'] === null)).toEqual([]);
		}
	});

	it('give a naming task its lead-in and no other task one', () => {
		const leadIns = Object.fromEntries(shippedSets.map(({ id, leadIn }) => [id, leadIn]));
		expect(leadIns).toEqual({
			'actions-en': 'This person is',
			'completion-en': null,
			'objects-de': 'Das ist',
			'objects-en': 'This is a',
			'reading-en': null,
			'repetition-en': null,
			'series-de': null,
			'series-en': null
		});
	});

	it.each(shippedSets.map((set) => [set.id, set] as const))('%s has no answer that another item accepts', (_, set) => {
		const spelled = (answer: string) => answer.toLocaleLowerCase(set.language);
		const collisions = set.items.flatMap((item) =>
			set.items
				.filter((other) => other !== item)
				.filter((other) => [other.answer, ...other.accepted].map(spelled).includes(spelled(item.answer)))
				.map((other) => `${item.answer}: ${item.id}, ${other.id}`)
		);
		expect(collisions).toEqual([]);
	});

	it('never use one picture twice in a set', () => {
		for (const { items } of shippedSets) {
			const pictures = items.flatMap(({ picture }) => picture ?? []);
			expect(new Set(pictures).size).toBe(pictures.length);
		}
	});

	it('give the same picture the same id in both languages', () => {
		const english = new Map(shippedSet('objects-en').items.map(({ id, picture }) => [id, picture]));
		const german = shippedSet('objects-de').items;
		expect(german.filter(({ id, picture }) => english.get(id) !== picture)).toEqual([]);
		const missing = [...english.keys()].filter((id) => !german.some((item) => item.id === id));
		// The padlock's everyday German name is that of the castle.
		expect(missing).toEqual(['obj-lock']);
	});

	it('show nothing that could frighten: no weapon, needle, skull, vermin, religious sign or tears', () => {
		const frightening =
			/knife|dagger|axe|pistol|gun|bomb|sword|syringe|skull|ghost|spider|snake|shark|coffin|grave|church|mosque|cross|crying|tears|blood|drop-of/;
		const shown = shippedSets.flatMap(({ items }) => items.flatMap(({ picture }) => picture ?? []));
		expect(shown.length).toBeGreaterThan(250);
		expect(shown.filter((picture) => frightening.test(picture))).toEqual([]);
	});

	it('credit Google for each picture and Carnegie Mellon University for each sound', () => {
		for (const { picture, sound, licence, attribution } of shippedSets.flatMap(({ items }) => items)) {
			if (picture !== null) expect([licence, attribution]).toEqual(['Apache-2.0', expect.stringContaining('Google')]);
			if (sound !== null) expect(attribution).toContain('Carnegie Mellon University');
			if (picture === null && sound === null) expect([licence, attribution]).toEqual(['CC0-1.0', null]);
		}
	});

	it('mark the sentences that leave many endings open', () => {
		const open = having('completion-en', 'low-constraint').map(({ text }) => text);
		expect(open).toContain('He climbed up the …');
		expect(having('completion-en', 'high-constraint').length).toBeGreaterThanOrEqual(40);
	});
});
