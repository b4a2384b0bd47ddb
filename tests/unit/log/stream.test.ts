import { afterEach, describe, expect, it, vi } from 'vitest';
import { hub, staffRoom } from '../../../src/lib/server/live/hub';
import type { StoredEvent } from '../../../src/lib/server/log/log';
import { GET } from '../../../src/routes/api/cases/[code]/stream/+server';

const CODE = 'tamu-rilo-38';

/** The reading of the log, held until a test lets it go on. */
const reading = vi.hoisted(() => ({ entriesAfter: vi.fn<(code: string, after: number) => Promise<StoredEvent[]>>() }));
vi.mock('../../../src/lib/server/log/log', () => reading);

const stored = (position: number) => ({ position, id: `entry-${position}`, type: 'tag-placed' }) as StoredEvent;

const readers: ReadableStreamDefaultReader<Uint8Array>[] = [];
afterEach(async () => {
	for (const reader of readers.splice(0)) await reader.cancel();
});

/** Opens the stream of a case; answers with what gives all it has sent so far, or null once it has ended. */
async function open(headers: Record<string, string> = {}, query = ''): Promise<() => Promise<string | null>> {
	const url = new URL(`http://localhost/api/cases/${CODE}/stream${query}`);
	const event = {
		locals: { case: { code: CODE }, account: { id: 'surgeon' } },
		url,
		request: new Request(url, { headers })
	};
	const response = await GET(event as unknown as Parameters<typeof GET>[0]);
	const reader = (response.body as ReadableStream<Uint8Array>).getReader();
	readers.push(reader);
	let text = '';
	let ended = false;
	void (async () => {
		for (;;) {
			const { done, value } = await reader.read();
			if (done) break;
			text += new TextDecoder().decode(value);
		}
		ended = true;
	})();
	return async () => {
		await new Promise((later) => setTimeout(later, 5));
		return ended ? null : text;
	};
}

function ids(text: string | null): number[] {
	return [...(text ?? '').matchAll(/^id: (\d+)$/gm)].map(([, id]) => Number(id));
}

describe('a stream that begins while entries are stored', () => {
	it('gives each once and in order: stored before the reading, during it, and after it', async () => {
		let found: (events: StoredEvent[]) => void = () => {};
		reading.entriesAfter.mockReturnValue(new Promise((resolve) => (found = resolve)));
		const sent = await open();
		hub.entries(staffRoom(CODE), [stored(3)]);
		hub.entries(staffRoom(CODE), [stored(4), stored(5)]);
		expect(ids(await sent())).toEqual([]);
		found([stored(1), stored(2), stored(3)]);
		expect(ids(await sent())).toEqual([1, 2, 3, 4, 5]);
		hub.entries(staffRoom(CODE), [stored(6)]);
		expect(ids(await sent())).toEqual([1, 2, 3, 4, 5, 6]);
	});

	it('reads from where Last-Event-ID says, and from `after` without one', async () => {
		reading.entriesAfter.mockResolvedValue([]);
		await open({ 'last-event-id': '7' }, '?after=3');
		expect(reading.entriesAfter).toHaveBeenLastCalledWith(CODE, 7);
		await open({}, '?after=3');
		expect(reading.entriesAfter).toHaveBeenLastCalledWith(CODE, 3);
	});

	it('ends when the log cannot be read: heartbeats alone would look like a log in which nothing happens', async () => {
		const said = vi.spyOn(console, 'error').mockReturnValue();
		reading.entriesAfter.mockRejectedValue(new Error('disk'));
		const sent = await open();
		expect(await sent()).toBeNull();
		expect(hub.count(staffRoom(CODE))).toBe(0);
		expect(said).toHaveBeenCalledOnce();
		said.mockRestore();
	});
});
