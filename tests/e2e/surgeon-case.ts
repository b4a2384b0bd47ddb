import { hash } from '@node-rs/argon2';
import Database from 'better-sqlite3';
import { spawn, type ChildProcess } from 'node:child_process';
import { randomUUID } from 'node:crypto';
import { mkdtempSync, rmSync } from 'node:fs';
import { createServer, type AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { v7 } from 'uuid';
import type { EventData, EventType } from '../../src/lib/mapping/events';
import type { Score } from '../../src/lib/mapping/vocabulary';

export const PASSWORD = 'an invented password of a test';

/** The production build, served from an empty folder of its own, with two invented accounts. */
export class TestServer {
	readonly origin: string;
	readonly examiner = { id: randomUUID(), email: 'examiner@test.invalid', roles: ['examiner'] };
	readonly surgeon = { id: randomUUID(), email: 'surgeon@test.invalid', roles: ['surgeon'] };
	#folder = mkdtempSync(join(tmpdir(), 'wordkeep-'));
	#process: ChildProcess | undefined;

	private constructor(readonly port: number) {
		this.origin = `http://localhost:${port}`;
	}

	/** A server on a port that nobody else has, with its accounts. */
	static async create(): Promise<TestServer> {
		const server = new TestServer(await freePort());
		await server.start();
		await server.#addAccounts();
		return server;
	}

	async start(): Promise<void> {
		this.#process = spawn(process.execPath, ['src/cli/start.js'], {
			env: { ...process.env, PORT: String(this.port), HOST: '127.0.0.1', DATA_DIR: this.#folder },
			stdio: ['ignore', 'ignore', 'inherit']
		});
		for (let tries = 0; ; tries++) {
			await new Promise((wait) => setTimeout(wait, 100));
			if (this.#process.exitCode !== null) throw new Error('the server has ended');
			if (tries === 100) throw new Error('the server does not answer');
			const answer = await fetch(`${this.origin}/api/clock`).catch(() => null);
			if (answer?.ok) return;
		}
	}

	/** Ends the server as a power cut would. */
	async kill(): Promise<void> {
		const running = this.#process!;
		const ended = new Promise((resolve) => running.once('exit', resolve));
		running.kill('SIGKILL');
		await ended;
	}

	async remove(): Promise<void> {
		if (this.#process?.exitCode === null && this.#process.signalCode === null) await this.kill();
		rmSync(this.#folder, { recursive: true });
	}

	async #addAccounts(): Promise<void> {
		const passwordHash = await hash(PASSWORD);
		this.#write((db) => {
			const insert = db.prepare(
				'INSERT INTO accounts (id, email, name, roles, password_hash, created_at) VALUES (?, ?, ?, ?, ?, ?)'
			);
			for (const { id, email, roles } of [this.examiner, this.surgeon]) {
				insert.run(id, email, email, JSON.stringify(roles), passwordHash, new Date().toISOString());
			}
		});
	}

	/** Puts an entry into a case log that this program would refuse: what a newer one may have left there. */
	addForeignEntry(code: string, type: string): void {
		this.#write((db) => {
			const { position } = db
				.prepare('SELECT max(position) AS position FROM case_log WHERE case_code = ?')
				.get(code) as { position: number };
			const event = { id: v7(), type, at: new Date().toISOString(), device: 'newer', monotonic: 0, data: {} };
			db.prepare('INSERT INTO case_log VALUES (?, ?, ?, ?, ?, ?, ?)').run(
				code,
				position + 1,
				event.id,
				event.at,
				this.examiner.id,
				JSON.stringify(event),
				'0'.repeat(64)
			);
		});
	}

	#write(work: (db: Database.Database) => void): void {
		const db = new Database(join(this.#folder, 'wordkeep.db'), { timeout: 5000 });
		work(db);
		db.close();
	}
}

async function freePort(): Promise<number> {
	const probe = createServer();
	await new Promise<void>((listening) => probe.listen(0, '127.0.0.1', listening));
	const { port } = probe.address() as AddressInfo;
	await new Promise((closed) => probe.close(closed));
	return port;
}

/** The examiner's part, played through the API. */
export class TestCase {
	readonly device = 'staff-test';
	#monotonic = 0;

	private constructor(
		readonly origin: string,
		private readonly cookie: string,
		readonly code: string
	) {}

	static async create(server: TestServer): Promise<TestCase> {
		const answer = await fetch(`${server.origin}/api/sign-in`, {
			method: 'POST',
			headers: { 'content-type': 'application/json' },
			body: JSON.stringify({ email: server.examiner.email, password: PASSWORD })
		});
		if (!answer.ok) throw new Error(`sign-in: ${answer.status}`);
		const cookie = answer.headers
			.getSetCookie()
			.map((line) => line.split(';')[0])
			.join('; ');
		const made = await fetch(`${server.origin}/api/cases`, {
			method: 'POST',
			headers: { 'content-type': 'application/json', cookie },
			body: JSON.stringify({ hemisphere: 'left', languages: ['en', 'de'], team: [server.surgeon.id] })
		});
		if (!made.ok) throw new Error(`case: ${made.status} ${await made.text()}`);
		return new TestCase(server.origin, cookie, ((await made.json()) as { code: string }).code);
	}

	/** @returns the ids of the entries */
	async note(...notes: { [T in EventType]: [T, EventData[T]] }[EventType][]): Promise<string[]> {
		const events = notes.map(([type, data]) => ({
			id: v7(),
			type,
			at: new Date().toISOString(),
			device: this.device,
			monotonic: this.#monotonic++,
			data
		}));
		for (let from = 0; from < events.length; from += 100) {
			await this.#post('events', { events: events.slice(from, from + 100) });
		}
		return events.map(({ id }) => id);
	}

	/** Presents one item and, with a score, scores it. @returns the trial and the ids of its entries */
	async trial(
		given: Partial<EventData['trial-presented']> & { tag: string | null },
		score?: Score
	): Promise<{ trial: string; entries: string[] }> {
		const trial = v7();
		const presented = {
			trial,
			item: 'cat',
			task: 'object-naming',
			language: 'en',
			stimulated: given.tag !== null,
			milliamps: given.tag === null ? null : 3,
			...given
		};
		const entries = await this.note(
			['trial-presented', presented],
			...(score
				? [['trial-scored', { trial, score, corrects: [] }] as ['trial-scored', EventData['trial-scored']]]
				: [])
		);
		return { trial, entries };
	}

	async presence(said: { waiting: number; oldest: number; leads: string | null }): Promise<void> {
		await this.#post('presence', { device: this.device, ...said });
	}

	async map(asked = 'language'): Promise<MapAnswer> {
		const answer = await fetch(`${this.origin}/api/cases/${this.code}/map?class=${asked}`, {
			headers: { cookie: this.cookie }
		});
		return (await answer.json()) as MapAnswer;
	}

	async #post(path: string, body: unknown): Promise<void> {
		const answer = await fetch(`${this.origin}/api/cases/${this.code}/${path}`, {
			method: 'POST',
			headers: { 'content-type': 'application/json', cookie: this.cookie },
			body: JSON.stringify(body)
		});
		if (!answer.ok) throw new Error(`${path}: ${answer.status} ${await answer.text()}`);
	}
}

export interface MapAnswer {
	sites: {
		tag: string;
		task: string;
		language: string;
		verdict: string;
		disturbed: number;
		valid: number;
		excluded: number;
	}[];
	tags: { tag: string; result: string; positive: string[]; open: { task: string; language: string }[] }[];
}
