import { spawn, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import { mkdtempSync, rmSync } from 'node:fs';
import { createServer, type AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { createInterface } from 'node:readline';
import { Client } from './client';

/** The production build, running as it does in a clinic, with data of its own. */
export interface Server {
	/** `http://localhost:PORT` */
	url: string;
	port: number;
	dataDir: string;
	/** path of the link that makes the first administrator, when one was printed */
	setUp: string | null;
	/** everything it printed, by line */
	printed: string[];
	/** Ends it as the operating system would; its data stay, for a start after it. */
	stop(): Promise<void>;
	/** Ends it without warning, as a power cut would. */
	kill(): Promise<void>;
	/** Ends it for good, its data with it. */
	discard(): Promise<void>;
}

export interface ServerOptions {
	/** of a server before it, to start again on the same data; a new folder otherwise */
	dataDir?: string;
	/** a free one otherwise */
	port?: number;
	env?: Record<string, string>;
}

/** Starts the server and waits until it listens. */
export async function startServer(options: ServerOptions = {}): Promise<Server> {
	const dataDir = options.dataDir ?? mkdtempSync(join(tmpdir(), 'wordkeep-test-'));
	const port = options.port ?? (await freePort());
	const child = spawn(process.execPath, ['src/cli/start.js'], {
		env: { ...process.env, NODE_ENV: 'production', ...options.env, DATA_DIR: dataDir, PORT: String(port) },
		stdio: ['ignore', 'pipe', 'inherit']
	});
	const printed: string[] = [];
	await new Promise<void>((listening, failed) => {
		child.once('exit', (code) => failed(new Error(`the server ended with ${code}: ${printed.join('\n')}`)));
		createInterface({ input: child.stdout }).on('line', (line) => {
			printed.push(line);
			if (line.startsWith('Wordkeep serves on')) listening();
		});
	});
	const setUp = /\/set-up\/\S+/.exec(printed.join('\n'))?.[0] ?? null;
	const url = `http://localhost:${port}`;
	const stop = () => end(child, 'SIGTERM');
	const discard = async () => {
		await stop();
		rmSync(dataDir, { recursive: true, force: true });
	};
	return { url, port, dataDir, setUp, printed, stop, kill: () => end(child, 'SIGKILL'), discard };
}

async function end(child: ChildProcess, signal: NodeJS.Signals): Promise<void> {
	if (child.exitCode !== null || child.signalCode !== null) return;
	child.kill(signal);
	await once(child, 'exit');
}

async function freePort(): Promise<number> {
	const probe = createServer().listen(0);
	await once(probe, 'listening');
	const { port } = probe.address() as AddressInfo;
	probe.close();
	await once(probe, 'close');
	return port;
}

/** Password of every account that the tests make. */
export const PASSWORD = 'three words and a number 7';

export const ROLES = ['therapist', 'examiner', 'neurophysiologist', 'surgeon', 'reviewer', 'administrator'] as const;
export type RoleName = (typeof ROLES)[number];

export const emailOf = (role: string) => `${role}@clinic.invalid`;

/** Somebody signed in. */
export interface Member {
	id: string;
	email: string;
	client: Client;
}

/** Makes the first administrator by the link that the server printed. */
export async function firstAdministrator(server: Server): Promise<Member> {
	if (!server.setUp) throw new Error('the server printed no link for the first administrator');
	const client = new Client(server.url);
	const email = emailOf('administrator');
	const made = await client.form(server.setUp, { name: 'Administrator', email, password: PASSWORD });
	if (made.status !== 303) throw new Error(`set-up answered ${made.status}: ${made.text}`);
	const { body } = await client.post('/api/sign-in', { email, password: PASSWORD });
	return { id: body.account.id, email, client };
}

/** One account of each role, made as a clinic makes them, all signed in. */
export async function team(server: Server): Promise<Record<RoleName, Member>> {
	const administrator = await firstAdministrator(server);
	const members: Partial<Record<RoleName, Member>> = { administrator };
	for (const role of ROLES) members[role] ??= await newMember(server, administrator, role, [role]);
	return members as Record<RoleName, Member>;
}

/** Makes an account, uses its one-time link, and returns it signed in. */
export async function newMember(
	server: Server,
	administrator: Member,
	name: string,
	roles: RoleName[]
): Promise<Member> {
	const email = emailOf(name);
	const made = await administrator.client.post('/api/people', { name, email, roles });
	if (made.status !== 201) throw new Error(`making ${name} answered ${made.status}: ${made.text}`);
	const client = new Client(server.url);
	const joined = await client.form(made.body.link, { password: PASSWORD });
	if (joined.status !== 303) throw new Error(`the link of ${name} answered ${joined.status}: ${joined.text}`);
	return { id: made.body.person.id, email, client };
}
