import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { AnyCaseEvent } from '../../src/lib/mapping/events';
import { made, newCase, trials } from './entries';
import { startServer, team, type Member, type Server } from './server';

let server: Server;
let examiner: Member;
let surgeon: Member;
let code: string;

beforeAll(async () => {
	server = await startServer();
	({ examiner, surgeon } = await team(server));
});
beforeEach(async () => {
	code = await newCase(examiner, surgeon);
});
afterAll(() => server.discard());

async function send(...events: AnyCaseEvent[]): Promise<void> {
	const { status, text } = await examiner.client.post(`/api/cases/${code}/events`, { events });
	if (status !== 200) throw new Error(text);
}

async function map(query = '') {
	const { status, body } = await surgeon.client.get(`/api/cases/${code}/map${query}`);
	expect(status).toBe(200);
	return body as { sites: Record<string, unknown>[]; tags: Record<string, unknown>[] };
}

/** A row of a task and language nobody asked more of, with what a test says otherwise. */
const row = (other: Record<string, unknown>) => ({
	tag: '7',
	task: 'object-naming',
	language: 'en',
	excluded: 0,
	settled: null,
	remaining: 0,
	kinds: {},
	milliamps: [2.5, 2.5],
	...other
});

describe('the map of a case', () => {
	it('is empty before the first trial, but for the tags that are laid', async () => {
		expect(await map()).toEqual({ sites: [], tags: [] });
		await send(made('tag-placed', { tag: '12', kind: 'subcortical' }), made('tag-placed', { tag: '2' }));
		await send(made('tag-placed', { tag: '3' }), made('tag-removed', { tag: '3' }));
		expect(await map()).toEqual({
			sites: [],
			tags: [
				{ tag: '2', kind: 'cortical', result: 'untested', positive: [], open: [] },
				{ tag: '12', kind: 'subcortical', result: 'untested', positive: [], open: [] }
			]
		});
	});

	// DESIGN section 4: positive at n >= 3 and 3k >= 2n, negative at n >= 3 otherwise, open before; two of two is settled.
	it('has a row a tag, task and language, by the rule, with exactly the fields of the contract', async () => {
		await send(
			...trials(['anomia', 'intact', 'anomia'], { milliamps: 3 }),
			...trials(['speech-arrest', 'intact'], { milliamps: 1.5, tag: '12' }),
			...trials(['intact', 'not-scorable', 'intact', 'intact', null], { language: 'de-AT' }),
			...trials(['anomia', 'anomia'], { tag: '7B' }),
			...trials(['seizure'], { tag: 'A' })
		);
		expect((await map()).sites).toEqual([
			row({
				language: 'de-AT',
				verdict: 'negative',
				disturbed: 0,
				valid: 3,
				excluded: 1
			}),
			row({ verdict: 'positive', disturbed: 2, valid: 3, kinds: { anomia: 2 }, milliamps: [3, 3] }),
			row({
				tag: '7B',
				verdict: 'open',
				disturbed: 2,
				valid: 2,
				settled: 'positive',
				remaining: 1,
				kinds: { anomia: 2 }
			}),
			row({
				tag: '12',
				verdict: 'open',
				disturbed: 1,
				valid: 2,
				remaining: 1,
				kinds: { 'speech-arrest': 1 },
				milliamps: [1.5, 1.5]
			}),
			row({ tag: 'A', verdict: 'untested', disturbed: 0, valid: 0, excluded: 1, remaining: 3, milliamps: null })
		]);
	});

	// DESIGN section 4: speech arrest is disturbed for language and excluded for speech-motor; dysarthria the other way round.
	it('has the other class when asked for it, and tells in the tags which class is positive', async () => {
		await send(...trials(['dysarthria', 'dysarthria', 'speech-arrest', 'dysarthria']));
		expect((await map()).sites).toEqual([
			row({ verdict: 'negative', disturbed: 1, valid: 4, kinds: { dysarthria: 3, 'speech-arrest': 1 } })
		]);
		const motor = await map('?class=speech-motor');
		expect(motor.sites).toEqual([
			row({ verdict: 'positive', disturbed: 3, valid: 3, excluded: 1, kinds: { dysarthria: 3 } })
		]);
		expect(motor.tags).toEqual([
			{ tag: '7', kind: 'cortical', result: 'positive', positive: ['speech-motor'], open: [] }
		]);
		expect((await map('?class=language')).tags).toEqual(motor.tags);
	});

	it('has a stimulation without language in the class speech-motor alone', async () => {
		await send(...trials(['negative-motor', 'intact'], { item: null, task: 'tongue-movement' }));
		const { sites, tags } = await map();
		expect(sites).toEqual([]);
		expect(tags).toEqual([expect.objectContaining({ tag: '7', result: 'open', positive: [] })]);
		expect((await map('?class=speech-motor')).sites).toEqual([
			row({
				task: 'tongue-movement',
				verdict: 'open',
				disturbed: 1,
				valid: 2,
				remaining: 1,
				kinds: { 'negative-motor': 1 }
			})
		]);
	});

	it('names what a tag still needs when the protocol requires it', async () => {
		const required = [
			{ task: 'object-naming', language: 'en' },
			{ task: 'reading', language: 'en' }
		];
		await send(made('protocol-set', { required }), ...trials(['intact', 'intact', 'intact']));
		expect((await map()).tags).toEqual([
			{ tag: '7', kind: 'cortical', result: 'open', positive: [], open: [{ task: 'reading', language: 'en' }] }
		]);
		await send(...trials(['intact', 'intact', 'intact'], { task: 'reading' }));
		expect((await map()).tags).toEqual([{ tag: '7', kind: 'cortical', result: 'negative', positive: [], open: [] }]);
	});

	it('leaves controls and trials of other runs out of the rows', async () => {
		const run = '0190b1c2-0000-7000-8000-000000000001';
		await send(
			made('run-opened', { run, purpose: 'ladder' }),
			...trials(['anomia', 'anomia', 'anomia'], { run }),
			...trials(['anomia', 'anomia', 'anomia'], { stimulated: false })
		);
		expect(await map()).toEqual({ sites: [], tags: [] });
	});

	it('has no other class', async () => {
		const { status, body } = await surgeon.client.get(`/api/cases/${code}/map?class=other`);
		expect(status).toBe(422);
		expect(body.error).toContain('speech-motor');
	});
});
