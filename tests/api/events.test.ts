import { v7 } from 'uuid';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { canonical, hashOf, type Stored } from './canonical';
import type { Answer } from './client';
import { cookieOf, made, newCase, trials } from './entries';
import { startServer, team, type Member, type RoleName, type Server } from './server';

let server: Server;
let members: Record<RoleName, Member>;
let examiner: Member;
let code: string;

beforeAll(async () => {
	server = await startServer();
	members = await team(server);
	examiner = members.examiner;
});
afterAll(() => server.discard());

async function anotherCase(): Promise<void> {
	code = await newCase(examiner);
}

const events = () => `/api/cases/${code}/events`;

function send(given: unknown[], by = examiner): Promise<Answer> {
	return by.client.post(events(), { events: given });
}

/** Sends text or bytes as they are. */
function sendRaw(body: BodyInit): Promise<Answer> {
	return examiner.client.request('POST', events(), { body, headers: { 'content-type': 'application/json' } });
}

async function log(after?: number): Promise<Stored[]> {
	const path = after === undefined ? events() : `${events()}?after=${after}`;
	return (await examiner.client.get(path)).body.events;
}

const placed = (tag: string, other: object = {}) => ({ ...made('tag-placed', { tag }), ...other });

describe('appending to a case log', () => {
	beforeAll(anotherCase);

	it('gives positions 1, 2, 3 without gaps, in the order sent', async () => {
		const [first, second, third] = [placed('1'), placed('2'), placed('3')];
		expect((await send([first, second])).body.stored).toEqual([
			{ id: first.id, position: 1 },
			{ id: second.id, position: 2 }
		]);
		expect(await send([third])).toMatchObject({ status: 200, body: { stored: [{ id: third.id, position: 3 }] } });
		expect((await log()).map(({ position, id }) => [position, id])).toEqual([
			[1, first.id],
			[2, second.id],
			[3, third.id]
		]);
	});

	it('counts each case for itself', async () => {
		const other = await newCase(examiner);
		const { body } = await examiner.client.post(`/api/cases/${other}/events`, { events: [placed('1')] });
		expect(body.stored[0]?.position).toBe(1);
	});

	it('takes an empty list and stores nothing', async () => {
		const before = await log();
		expect(await send([])).toMatchObject({ status: 200, body: { stored: [] } });
		expect(await log()).toEqual(before);
	});
});

describe('an entry sent again', () => {
	beforeAll(anotherCase);
	const event = { ...made('trial-scored', { trial: v7(), score: 'anomia', corrects: [], said: 'hut' }), by: undefined };

	it('keeps its position and is stored once, whatever the order of its fields', async () => {
		expect((await send([event])).body.stored).toEqual([{ id: event.id, position: 1 }]);
		await send([placed('1')]);
		const { data, ...rest } = event;
		const turned = { data: Object.fromEntries(Object.entries(data).reverse()), ...rest };
		expect(JSON.stringify(turned)).not.toBe(JSON.stringify(event));
		expect((await send([event, placed('2'), turned])).body.stored.map(({ position }: Stored) => position)).toEqual([
			1, 3, 1
		]);
		expect((await log()).map(({ position }) => position)).toEqual([1, 2, 3]);
	});

	it('is the same when its numbers are written in another way', async () => {
		const body = JSON.stringify({ events: [event] }).replace('"monotonic":12.5', '"monotonic":1.250e1');
		expect(body).toContain('1.250e1');
		expect((await sendRaw(body)).body).toEqual({ stored: [{ id: event.id, position: 1 }] });
	});

	it('with other content is refused with 409, and nothing of its batch is stored', async () => {
		const before = await log();
		const other = { ...event, data: { ...event.data, score: 'intact' } };
		expect(await send([placed('8'), other, placed('9')])).toMatchObject({
			status: 409,
			body: { error: expect.any(String), index: 1, id: event.id }
		});
		expect(await log()).toEqual(before);
	});

	it('with other content in one batch is refused too', async () => {
		const before = await log();
		const twice = placed('4');
		expect(await send([twice, { ...twice, data: { tag: '5' } }])).toMatchObject({
			status: 409,
			body: { index: 1, id: twice.id }
		});
		expect(await log()).toEqual(before);
	});

	it('stands in another case with content of its own', async () => {
		const other = await newCase(examiner);
		const { status } = await examiner.client.post(`/api/cases/${other}/events`, {
			events: [{ ...event, data: { ...event.data, score: 'intact' } }]
		});
		expect(status).toBe(200);
	});
});

describe('a batch with one bad entry', () => {
	beforeAll(anotherCase);

	it('is refused whole with 422, its index and its id, before any 409', async () => {
		const first = placed('1');
		await send([first]);
		const bad = placed('0');
		const { status, body } = await send([{ ...first, data: { tag: '2' } }, placed('3'), bad]);
		expect(status).toBe(422);
		expect(body).toEqual({ error: expect.stringContaining('data.tag'), index: 2, id: bad.id });
		expect(await log()).toHaveLength(1);
	});

	const trial = v7();
	const presented = { trial, item: 'x', task: 'reading', language: 'en', tag: '7', stimulated: true, milliamps: 2 };
	const event = made('tag-placed', { tag: '1' });

	it.each<[string, unknown, string]>([
		['no entry', null, 'type'],
		['text', 'tag-placed', 'type'],
		['an unknown type', { ...event, type: 'tag-moved' }, 'tag-moved'],
		['a type of every object', { ...event, type: 'constructor' }, 'constructor'],
		['an unknown version', { ...event, v: 2 }, 'v:'],
		['an unknown field', { ...event, colour: 'red' }, 'colour'],
		['an unknown field in its data', { ...event, data: { tag: '1', shape: 'round' } }, 'shape'],
		['a position of its own', { ...event, position: 7 }, 'position'],
		['an id that is no UUID', { ...event, id: 'one' }, 'id'],
		['an id of another version', { ...event, id: 'f81d4fae-7dec-4bd0-a765-00a0c91e6bf6' }, 'id'],
		['no id', { ...event, id: undefined }, 'id'],
		['no time', { ...event, at: undefined }, 'at'],
		['a time without offset', { ...event, at: '2031-03-05T12:00:00' }, 'at'],
		['a day that never was', { ...event, at: '2031-02-30T12:00:00Z' }, 'at'],
		['a device without name', { ...event, device: '' }, 'device'],
		['a monotonic that is text', { ...event, monotonic: '5' }, 'monotonic'],
		['an uncertainty below none', { ...event, uncertainty: -1 }, 'uncertainty'],
		['a boot that is no UUID', { ...event, boot: 'yes' }, 'boot'],
		['a clock that is none', { ...event, clock: 'noon' }, 'clock'],
		['a tag of four letters', placed('ABCD'), 'data.tag'],
		['a tag in small letters', placed('a'), 'data.tag'],
		['a score of no vocabulary', made('trial-scored', { trial, score: 'bad' as 'intact', corrects: [] }), 'data.score'],
		['a score without what it replaces', made('trial-scored', { trial, score: 'intact' } as never), 'data.corrects'],
		['stimulation without a tag', made('trial-presented', { ...presented, tag: null }), 'stimulated'],
		[
			'a trial without milliamps',
			made('trial-presented', { ...presented, milliamps: undefined } as never),
			'milliamps'
		],
		['a task in capitals', made('trial-presented', { ...presented, task: 'Reading' }), 'data.task'],
		['a language that is none', made('trial-presented', { ...presented, language: 'english!' }), 'data.language'],
		['a purpose of its own', made('run-opened', { run: v7(), purpose: 'play' as 'mapping' }), 'data.purpose'],
		['a share above one', made('protocol-set', { rule: { minTrials: 3, share: [4, 3] } }), 'data.rule.share'],
		['an effect of no kind', made('protocol-set', { effects: { laugh: {} } as never }), 'laugh'],
		['a negative current', made('trial-presented', { ...presented, milliamps: -1 }), 'data.milliamps'],
		['half a character', made('tag-placed', { tag: '1' }, { device: 'half \ud83e' }), 'device'],
		['somebody who is not on the team', { ...event, by: 'nobody' }, 'by']
	])('%s is refused, naming it', async (_, bad, named) => {
		const before = await log();
		const { status, body } = await send([placed('5'), bad]);
		expect(status).toBe(422);
		expect(body.error).toContain(named);
		expect(body.index).toBe(1);
		expect(body.id).toBe((bad as { id?: string } | null)?.id);
		expect(await log()).toEqual(before);
	});

	it('with the one field that no object can have but JSON can is refused, naming it', async () => {
		for (const [field, text] of [
			[
				'effects',
				JSON.stringify(made('protocol-set', { effects: {} })).replace('"effects":{}', '"effects":{"__proto__":{}}')
			],
			['event', JSON.stringify(event).replace('{', '{"__proto__":{"x":1},')]
		] as const) {
			const refused = await sendRaw(`{"events":[${text}]}`);
			expect([field, refused.status]).toEqual([field, 422]);
			expect(refused.body.error).toContain('__proto__');
		}
	});
});

describe('a request that holds no list of entries', () => {
	beforeAll(anotherCase);

	it.each([
		['text', 'no JSON', 400],
		['bytes that are no UTF-8', Buffer.from([0x7b, 0xff, 0x7d]), 400],
		['null', 'null', 422],
		['a list', '[]', 422],
		['entries that are null', '{"events":null}', 422],
		['entries that are an object', '{"events":{}}', 422]
	])('%s is refused and nothing stored', async (_, body, status) => {
		const refused = await sendRaw(body);
		expect(refused.status).toBe(status);
		expect(refused.body.error).toEqual(expect.any(String));
		expect(await log()).toEqual([]);
	});
});

describe('the size of a request', () => {
	beforeAll(anotherCase);
	const KIB_256 = 256 * 1024;

	function sized(bytes: number): string {
		const body = JSON.stringify({ events: [placed('1')] });
		return body + ' '.repeat(bytes - body.length);
	}

	it('may be 500 entries, and no more', async () => {
		const many = Array.from({ length: 501 }, () => placed('1'));
		expect(await send(many)).toMatchObject({ status: 413, body: { error: expect.stringContaining('in parts') } });
		expect(await log()).toEqual([]);
		expect((await send(many.slice(0, 500))).body.stored.at(-1)?.position).toBe(500);
	});

	it('may be 256 KiB, and no more, whether it says its length or not', async () => {
		const before = await log();
		for (const size of [KIB_256 + 1, 3 * KIB_256, 40 * KIB_256]) {
			const whole = await sendRaw(sized(size));
			expect([size, whole.status]).toEqual([size, 413]);
			expect(whole.body.error).toContain('in parts');
			const chunked = await fetch(server.url + events(), {
				method: 'POST',
				headers: { ...cookieOf(examiner.client), 'content-type': 'application/json' },
				body: new Blob([sized(size)]).stream(),
				duplex: 'half'
			} as RequestInit);
			expect([size, chunked.status]).toEqual([size, 413]);
			expect(await chunked.json()).toEqual({ error: whole.body.error });
		}
		expect(await log()).toEqual(before);
		expect((await sendRaw(sized(KIB_256))).status).toBe(200);
	});

	it('is judged before what is in it', async () => {
		expect((await send(Array.from({ length: 501 }, () => null))).status).toBe(413);
	});
});

describe('the case log as it is read', () => {
	beforeAll(anotherCase);

	it('has every entry as it came, with position, receivedAt, sender and hash', async () => {
		const sent = {
			...made('trial-scored', { trial: v7(), score: 'anomia', corrects: [], said: 'Häuschen "x" \u2028 🧠' }),
			at: '2031-03-05T12:00:00.123456+05:45',
			clock: '2031-03-05T06:15:00Z',
			uncertainty: 0.1 + 0.2,
			boot: v7(),
			by: examiner.id,
			v: 1
		};
		const before = Date.now();
		await send([sent]);
		const [{ position, receivedAt, sender, hash, ...event }] = (await log()) as [Stored];
		expect(event).toEqual(sent);
		expect(JSON.stringify(event)).toBe(JSON.stringify(sent));
		expect({ position, sender }).toEqual({ position: 1, sender: examiner.id });
		expect(Date.parse(receivedAt)).toBeGreaterThanOrEqual(before - 1000);
		expect(Date.parse(receivedAt)).toBeLessThanOrEqual(Date.now() + 1000);
		expect(hash).toMatch(/^[0-9a-f]{64}$/);
	});

	it('is chained by the formula of the contract, from 64 zeros on', async () => {
		await send(trials(['anomia', 'intact', null]));
		const entries = await log();
		expect(entries.length).toBeGreaterThan(5);
		let previous = '0'.repeat(64);
		for (const entry of entries) {
			expect(entry.hash).toBe(hashOf(previous, code, entry));
			previous = entry.hash;
		}
	});

	it('is given from a position on', async () => {
		const all = await log();
		expect(await log(0)).toEqual(all);
		expect(await log(2)).toEqual(all.slice(2));
		expect(await log(all.length)).toEqual([]);
		expect(await log(10_000)).toEqual([]);
	});

	it.each(['-1', '1.5', 'one', '0x10', '1e3', ' 1', '99999999999999999999'])('has no position %s', async (after) => {
		expect((await examiner.client.get(`${events()}?after=${encodeURIComponent(after)}`)).status).toBe(422);
	});
});

describe('several people on a case', () => {
	it('act for one another by name when they are on its team, and the log keeps who sent it', async () => {
		const { therapist, neurophysiologist: stranger } = members;
		code = await newCase(examiner, therapist);
		expect((await send([placed('1', { by: therapist.id })])).status).toBe(200);
		expect(await send([placed('2', { by: stranger.id })])).toMatchObject({ status: 422, body: { index: 0 } });
		expect((await log()).map(({ by, sender }) => [by, sender])).toEqual([[therapist.id, examiner.id]]);
	});

	it('the same entry from two of them is one', async () => {
		const { therapist } = members;
		code = await newCase(examiner, therapist);
		const event = placed('1');
		await send([event]);
		expect((await send([event], therapist)).body.stored).toEqual([{ id: event.id, position: 1 }]);
		expect((await log()).map(({ sender }) => sender)).toEqual([examiner.id]);
	});

	it('post at once and leave no gap; each batch stays together, every answer is true', async () => {
		const other = members.neurophysiologist;
		code = await newCase(examiner, other);
		const batches = Array.from({ length: 40 }, (_, index) => ({
			by: index % 2 === 0 ? examiner : other,
			given: Array.from({ length: 1 + (index % 5) }, () => placed('1'))
		}));
		const answers = await Promise.all(batches.map(({ given, by }) => send(given, by)));
		const entries = await log();
		expect(entries.map(({ position }) => position)).toEqual(entries.map((_, index) => index + 1));
		expect(entries).toHaveLength(batches.reduce((sum, { given }) => sum + given.length, 0));
		const positions = new Map(entries.map(({ id, position }) => [id, position]));
		answers.forEach(({ body: { stored } }, index) => {
			expect(stored.map(({ id }: Stored) => id)).toEqual(batches[index]?.given.map(({ id }) => id));
			stored.forEach(({ id, position }: Stored, place: number) => {
				expect(position).toBe(positions.get(id));
				expect(position).toBe((stored[0]?.position ?? 0) + place);
			});
		});
		let previous = '0'.repeat(64);
		for (const entry of entries) expect(entry.hash).toBe((previous = hashOf(previous, code, entry)));
	});

	it('the same entries sent by two at once are stored once', async () => {
		const other = members.neurophysiologist;
		code = await newCase(examiner, other);
		const given = Array.from({ length: 20 }, () => placed('1'));
		const answers = await Promise.all(Array.from({ length: 10 }, (_, n) => send(given, n % 2 ? other : examiner)));
		expect(new Set(answers.map(({ body }) => canonical(body))).size).toBe(1);
		expect(await log()).toHaveLength(20);
	});
});

describe('a server that is killed', () => {
	it('has every entry it acknowledged when it starts again, and goes on with the next position', async () => {
		await anotherCase();
		const acknowledged: string[] = [];
		let running = true;
		const sending = (async () => {
			while (running) {
				try {
					const { body } = await send([placed('1')]);
					acknowledged.push(...body.stored.map(({ id }: Stored) => id));
				} catch {
					return;
				}
			}
		})();
		while (acknowledged.length < 30) await new Promise((later) => setTimeout(later, 5));
		await server.kill();
		running = false;
		await sending;
		server = await startServer(server);
		const entries = await log();
		expect(entries.map(({ id }) => id)).toEqual(expect.arrayContaining(acknowledged));
		expect((await send([placed('2')])).body.stored[0]?.position).toBe(entries.length + 1);
	});
});
