import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { Stored } from './canonical';
import { made, newCase } from './entries';
import { startServer, team, type Member, type Server } from './server';
import { StreamReader } from './stream-reader';

let server: Server;
let examiner: Member;
let surgeon: Member;
let code: string;
const readers: StreamReader[] = [];

beforeAll(async () => {
	server = await startServer();
	({ examiner, surgeon } = await team(server));
});
beforeEach(async () => {
	code = await newCase(examiner, surgeon);
});
afterAll(async () => {
	await Promise.all(readers.map((reader) => reader.close()));
	await server.discard();
});

async function open(query = '', headers: Record<string, string> = {}): Promise<StreamReader> {
	const reader = await StreamReader.open(surgeon.client, `/api/cases/${code}/stream${query}`, headers);
	readers.push(reader);
	return reader;
}

async function send(count: number): Promise<void> {
	const events = Array.from({ length: count }, () => made('tag-placed', { tag: '1' }));
	const { status } = await examiner.client.post(`/api/cases/${code}/events`, { events });
	if (status !== 200) throw new Error(`answered with ${status}`);
}

async function log(): Promise<Stored[]> {
	return (await examiner.client.get(`/api/cases/${code}/events`)).body.events;
}

const positions = (reader: StreamReader) => reader.entries.map(({ position }) => position);
const range = (from: number, to: number) => Array.from({ length: to - from + 1 }, (_, index) => from + index);

describe('the stream of a case log', () => {
	it('is a stream of server-sent events whose messages are the entries of GET events, by position', async () => {
		await send(3);
		const reader = await open();
		expect(reader.response.status).toBe(200);
		expect(reader.response.headers.get('content-type')).toBe('text/event-stream');
		await send(2);
		await reader.until(({ entries }) => entries.length === 5);
		expect(reader.entries).toEqual(await log());
		const numbered = reader.messages.filter(({ id }) => id !== undefined);
		expect(numbered.map(({ id, event }) => [id, event])).toEqual(range(1, 5).map((id) => [String(id), undefined]));
	});

	it('begins after a position, and Last-Event-ID beats it', async () => {
		await send(5);
		const after = await open('?after=3');
		const both = await open('?after=1', { 'last-event-id': '4' });
		const back = await open('?after=4', { 'last-event-id': '1' });
		await send(1);
		await Promise.all(
			[after, both, back].map((reader) => reader.until(({ entries }) => entries.at(-1)?.position === 6))
		);
		expect(positions(after)).toEqual([4, 5, 6]);
		expect(positions(both)).toEqual([5, 6]);
		expect(positions(back)).toEqual([2, 3, 4, 5, 6]);
	});

	it('refuses what is no position', async () => {
		expect((await open('?after=first')).response.status).toBe(422);
		expect((await open('', { 'last-event-id': '1.5' })).response.status).toBe(422);
	});

	it('has a heartbeat each second, without an id', async () => {
		const reader = await open();
		const beats = () => reader.messages.filter(({ event }) => event === 'heartbeat');
		await reader.until(() => beats().length >= 4);
		for (const beat of beats()) expect(beat.id).toBeUndefined();
		const gaps = beats()
			.slice(2)
			.map(({ at }, index) => at - (beats()[index + 1]?.at ?? 0));
		// Never more often; how much later one comes is the machine's.
		expect(gaps.length).toBeGreaterThan(0);
		for (const gap of gaps) expect(gap).toBeGreaterThan(700);
	});

	it('gives an entry to everybody who reads, once and in order', async () => {
		const all = await Promise.all(range(1, 5).map(() => open()));
		for (const count of [1, 20, 3]) await send(count);
		await Promise.all(all.map((reader) => reader.until(({ entries }) => entries.length >= 24)));
		for (const reader of all) expect(positions(reader)).toEqual(range(1, 24));
	});

	it('gives no entry of another case', async () => {
		const reader = await open();
		const other = await newCase(examiner);
		await examiner.client.post(`/api/cases/${other}/events`, { events: [made('tag-placed', { tag: '2' })] });
		await send(1);
		await reader.until(({ entries }) => entries.length > 0);
		expect(reader.entries.map(({ data }) => data)).toEqual([{ tag: '1' }]);
	});

	it('loses nothing that is stored while a reader begins', async () => {
		let sending = true;
		const stored = (async () => {
			let count = 0;
			while (sending) {
				const batches = [1, 2, 1];
				await Promise.all(batches.map(send));
				count += 4;
			}
			return count;
		})();
		const begun: { reader: StreamReader; after: number }[] = [];
		for (let round = 0; round < 60; round++) {
			const after = round % 3 === 0 ? 0 : (begun.at(-1)?.reader.entries.at(-1)?.position ?? 0);
			begun.push({ after, reader: await open(`?after=${after}`) });
			if (begun.length > 8) await begun[begun.length - 9]?.reader.until(({ entries }) => entries.length > 3);
		}
		sending = false;
		const last = await stored;
		await Promise.all(begun.map(({ reader }) => reader.until(({ entries }) => entries.at(-1)?.position === last, 20)));
		for (const { reader, after } of begun) expect(positions(reader)).toEqual(range(after + 1, last));
		await Promise.all(begun.map(({ reader }) => reader.close()));
	});

	it('gives a long log whole to one who begins, and to one who comes back where it was cut', async () => {
		for (let sent = 0; sent < 3000; sent += 500) await send(500);
		const reader = await open();
		await reader.until(({ entries }) => entries.length === 3000);
		expect(positions(reader)).toEqual(range(1, 3000));
		await reader.close();
		await send(2);
		const again = await open('', { 'last-event-id': '2999' });
		await again.until(({ entries }) => entries.length === 3);
		expect(positions(again)).toEqual([3000, 3001, 3002]);
	});

	it('goes on for a reader that comes back after the server was killed', async () => {
		const before = await open();
		await send(4);
		await before.until(({ entries }) => entries.length === 4);
		await server.kill();
		server = await startServer(server);
		await send(2);
		const after = await open('', { 'last-event-id': before.messages.findLast(({ id }) => id !== undefined)?.id ?? '' });
		await after.until(({ entries }) => entries.length === 2);
		expect([...before.entries, ...after.entries]).toEqual(await log());
	});
});
