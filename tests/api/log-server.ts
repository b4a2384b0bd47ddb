import { spawn, type ChildProcess } from 'node:child_process';
import { randomUUID } from 'node:crypto';
import { existsSync, mkdtempSync, rmSync } from 'node:fs';
import { createServer } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import Database from 'better-sqlite3';
import { v7 } from 'uuid';
import type { AnyCaseEvent, EventData, EventType } from '../../src/lib/mapping/events';
import { hashPassword } from '../../src/lib/server/accounts/passwords';

const PASSWORD = 'an invented password';

/** A server of the production build with a folder of data of its own. */
export class LogServer {
	readonly dataDir = mkdtempSync(join(tmpdir(), 'case-log-'));
	url = '';
	#process: ChildProcess | null = null;

	static async start(): Promise<LogServer> {
		const server = new LogServer();
		await server.restart();
		return server;
	}

	/** Starts, or kills and starts again, over the same data. */
	async restart(): Promise<void> {
		await this.kill();
		if (!existsSync('build/handler.js')) throw new Error('there is no production build: run npm run build first');
		const port = await freePort();
		const env = { ...process.env, DATA_DIR: this.dataDir, PORT: String(port), HOST: '127.0.0.1' };
		const child = spawn(process.execPath, ['src/cli/start.js'], { env, stdio: ['ignore', 'pipe', 'inherit'] });
		this.#process = child;
		this.url = `http://127.0.0.1:${port}`;
		await new Promise<void>((ready, failed) => {
			child.stdout?.on('data', (text: Buffer) => text.includes('serves on') && ready());
			child.once('exit', (code) => failed(new Error(`the server ended with ${code}`)));
		});
	}

	/** As a power cut would. */
	async kill(): Promise<void> {
		const child = this.#process;
		if (!child || child.exitCode !== null || child.signalCode !== null) return;
		child.removeAllListeners('exit');
		await new Promise((ended) => {
			child.once('exit', ended);
			child.kill('SIGKILL');
		});
	}

	async stop(): Promise<void> {
		await this.kill();
		rmSync(this.dataDir, { recursive: true });
	}

	get database(): string {
		return join(this.dataDir, 'wordkeep.db');
	}

	/** Somebody with a new account, signed in. */
	async join(...roles: string[]): Promise<Client> {
		const [id, email] = [randomUUID(), `${randomUUID()}@demo.invalid`];
		const hash = await hashPassword(PASSWORD);
		const database = new Database(this.database);
		database
			.prepare('INSERT INTO accounts (id, email, name, roles, password_hash, created_at) VALUES (?, ?, ?, ?, ?, ?)')
			.run(id, email, `invented ${roles.join(' ')}`, JSON.stringify(roles), hash, new Date().toISOString());
		database.close();
		const client = new Client(this, id);
		await client.signIn(email);
		return client;
	}
}

async function freePort(): Promise<number> {
	const server = createServer();
	await new Promise<void>((listening) => server.listen(0, '127.0.0.1', listening));
	const address = server.address();
	await new Promise((closed) => server.close(closed));
	if (address === null || typeof address === 'string') throw new Error('no port');
	return address.port;
}

export interface Answer<T> {
	status: number;
	headers: Headers;
	body: T;
}

/** A program that is signed in as one account. */
export class Client {
	#cookie = '';

	constructor(
		readonly server: LogServer,
		readonly account: string
	) {}

	async signIn(email: string): Promise<void> {
		const answer = await this.request('/api/sign-in', { body: JSON.stringify({ email, password: PASSWORD }) });
		if (answer.status !== 200) throw new Error(`signing in was answered with ${answer.status}`);
		this.#cookie = answer.headers
			.getSetCookie()
			.map((cookie) => cookie.split(';')[0])
			.join('; ');
	}

	/** GET without a body, POST with one. */
	async request(path: string, init: RequestInit = {}): Promise<Response> {
		const headers = { cookie: this.#cookie, ...(init.headers as Record<string, string> | undefined) };
		const method = init.method ?? (init.body === undefined ? 'GET' : 'POST');
		return await fetch(`${this.server.url}${path}`, { ...init, method, headers });
	}

	async get<T>(path: string): Promise<Answer<T>> {
		return await read(await this.request(path));
	}

	async post<T>(path: string, body: unknown): Promise<Answer<T>> {
		return await read(await this.request(path, { body: JSON.stringify(body) }));
	}

	/** A new case, with others on its team; its code. */
	async newCase(...team: Client[]): Promise<string> {
		const given = { hemisphere: 'left', languages: ['en'], team: team.map(({ account }) => account) };
		const { status, body } = await this.post<{ code: string }>('/api/cases', given);
		if (status !== 201) throw new Error(`a new case was answered with ${status}`);
		return body.code;
	}
}

async function read<T>(response: Response): Promise<Answer<T>> {
	const text = await response.text();
	return { status: response.status, headers: response.headers, body: (text === '' ? null : JSON.parse(text)) as T };
}

/** One entry as a device would make it. */
export function made<T extends EventType>(
	type: T,
	data: EventData[T],
	other: Partial<AnyCaseEvent> = {}
): AnyCaseEvent {
	const base = { id: v7(), type, at: '2031-03-05T12:00:00.000+01:00', device: 'examiner', monotonic: 12.5, data };
	return { ...base, ...other } as AnyCaseEvent;
}

/** Trials at one tag, presented and scored; null leaves one without a score. */
export function trials(
	scores: readonly (EventData['trial-scored']['score'] | null)[],
	other: Partial<EventData['trial-presented']> = {}
): AnyCaseEvent[] {
	return scores.flatMap((score) => {
		const trial = v7();
		const presented = made('trial-presented', {
			trial,
			item: 'house',
			task: 'object-naming',
			language: 'en',
			tag: '7',
			stimulated: true,
			milliamps: 2.5,
			...other
		});
		return score === null ? [presented] : [presented, made('trial-scored', { trial, score, corrects: [] })];
	});
}
