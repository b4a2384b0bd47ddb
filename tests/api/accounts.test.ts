import Database from 'better-sqlite3';
import { readFileSync, readdirSync } from 'node:fs';
import { request } from 'node:http';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Client, type Answer } from './client';
import {
	emailOf,
	newMember,
	PASSWORD,
	ROLES,
	startServer,
	team,
	type Member,
	type RoleName,
	type Server
} from './server';

let server: Server;
let members: Record<RoleName, Member>;
let administrator: Client;

beforeAll(async () => {
	server = await startServer();
	members = await team(server);
	administrator = members.administrator.client;
});
afterAll(() => server.discard());

const signIn = (email: string, password: string) => new Client(server.url).post('/api/sign-in', { email, password });
const whoAmI = (client: Client) => client.get('/api/settings');

function sessionCookie(answer: Answer): string {
	return answer.headers.getSetCookie().find((cookie) => cookie.startsWith('wordkeep=')) ?? '';
}

/** Writes to the database beside the server, for what would take days otherwise. */
function inDatabase(sql: string, ...values: unknown[]): void {
	const database = new Database(join(server.dataDir, 'wordkeep.db'));
	database.prepare(sql).run(...values);
	database.close();
}

describe('signing in', () => {
	it('answers with the account and a session cookie that scripts and other sites cannot use', async () => {
		const answer = await signIn(members.surgeon.email, PASSWORD);
		expect(answer.status).toBe(200);
		expect(answer.body).toEqual({
			account: { id: members.surgeon.id, email: emailOf('surgeon'), name: 'surgeon', roles: ['surgeon'] }
		});
		const attributes = sessionCookie(answer).split('; ').slice(1);
		expect(attributes).toEqual(expect.arrayContaining(['Path=/', 'HttpOnly', 'SameSite=Lax']));
		// Over plain http neither Secure nor a name that demands it: the browser would drop the cookie.
		expect(attributes).not.toContain('Secure');
	});

	it('takes the address in any case and with blanks around it', async () => {
		expect((await signIn(`  ${members.surgeon.email.toUpperCase()} `, PASSWORD)).status).toBe(200);
	});

	it('gives a new session at each sign-in', async () => {
		const [first, second] = [
			await signIn(members.surgeon.email, PASSWORD),
			await signIn(members.surgeon.email, PASSWORD)
		];
		expect(sessionCookie(first)).not.toBe(sessionCookie(second));
	});

	// OWASP ASVS 5.0.0, 6.3.8: no way to tell a known account from an unknown one, response time included.
	it('looks and lasts the same for an unknown address and a wrong password', async () => {
		const unknown: number[] = [];
		const wrong: number[] = [];
		const said = new Set<string>();
		for (let round = 0; round < 8; round++) {
			for (const role of ROLES) {
				for (const [email, times] of [
					[`nobody-${round}-${role}@clinic.invalid`, unknown],
					[members[role].email, wrong]
				] as const) {
					const start = performance.now();
					const { status, text } = await signIn(email, 'not the right password');
					times.push(performance.now() - start);
					said.add(`${status} ${text}`);
				}
			}
		}
		for (const role of ROLES) await signIn(members[role].email, PASSWORD);
		expect(said).toEqual(new Set(['401 {"error":"The e-mail address or the password is wrong."}']));
		const ratio = median(unknown) / median(wrong);
		expect(ratio).toBeGreaterThan(0.7);
		expect(ratio).toBeLessThan(1.4);
	});

	// NIST SP 800-63B-4, section 3.2.2: failed attempts are limited; ASVS 6.1.1: nobody can be locked out by it.
	it('makes repeated wrong tries wait, and touches neither open sessions nor others', async () => {
		const { email, client } = await newMember(server, members.administrator, 'forgetful', ['reviewer']);
		for (let tries = 0; tries < 10; tries++) expect((await signIn(email, 'wrong')).status).toBe(401);
		const waiting = await signIn(email, PASSWORD);
		expect(waiting.status).toBe(429);
		expect(waiting.body.seconds).toBeGreaterThan(0);
		expect(waiting.body.seconds).toBeLessThanOrEqual(60);
		expect((await whoAmI(client)).status).toBe(200);
		expect((await signIn(members.surgeon.email, PASSWORD)).status).toBe(200);
		expect(await signInFrom('127.0.0.2', email, PASSWORD)).toBe(200);
	});

	it('works as a form before scripts are there, and goes on to the page that was asked for', async () => {
		const client = new Client(server.url);
		const asked = await client.get('/account?tab=1');
		expect(asked.status).toBe(303);
		expect(asked.headers.get('location')).toBe('/sign-in?to=%2Faccount%3Ftab%3D1');
		const page = await client.get(asked.headers.get('location')!);
		expect(page.text).toContain('name="to" value="/account?tab=1"');
		const fields = { email: members.surgeon.email, to: '/account?tab=1' };
		const wrong = await client.form('/sign-in?/in', { ...fields, password: 'wrong' });
		expect(wrong.status).toBe(401);
		expect(wrong.text).toContain('The e-mail address or the password is wrong.');
		expect(wrong.text).toContain(`value="${members.surgeon.email}"`);
		const right = await client.form('/sign-in?/in', { ...fields, password: PASSWORD });
		expect([right.status, right.headers.get('location')]).toEqual([303, '/account?tab=1']);
		expect((await client.get('/account')).status).toBe(200);
	});

	it.each([
		'https://elsewhere.invalid/',
		'//elsewhere.invalid',
		'/\\elsewhere.invalid',
		'javascript:alert(1)',
		'cases',
		''
	])('does not go on to %j', async (to) => {
		const client = new Client(server.url);
		const answer = await client.form('/sign-in?/in', { email: members.surgeon.email, password: PASSWORD, to });
		expect([answer.status, answer.headers.get('location')]).toEqual([303, '/cases']);
	});

	it('ends the session on the server when somebody signs out', async () => {
		const client = new Client(server.url);
		await client.post('/api/sign-in', { email: members.surgeon.email, password: PASSWORD });
		const before = client.copy();
		expect((await client.form('/sign-in?/out', {})).status).toBe(303);
		expect(client.cookies.size).toBe(0);
		expect((await whoAmI(before)).status).toBe(401);
	});
});

function median(values: number[]): number {
	const sorted = values.toSorted((a, b) => a - b);
	return sorted[Math.floor(sorted.length / 2)]!;
}

/** Signs in from another address of this computer. */
function signInFrom(localAddress: string, email: string, password: string): Promise<number> {
	return new Promise((answered, failed) => {
		const sent = request(
			{
				host: '127.0.0.1',
				port: server.port,
				localAddress,
				method: 'POST',
				path: '/api/sign-in',
				headers: { 'content-type': 'application/json' }
			},
			(response) => {
				response.resume();
				answered(response.statusCode ?? 0);
			}
		);
		sent.once('error', failed);
		sent.end(JSON.stringify({ email, password }));
	});
}

describe('an unsafe request from another origin', () => {
	const elsewhere = { origin: 'https://elsewhere.invalid' };
	const credentials = () => ({ email: members.surgeon.email, password: PASSWORD });

	it.each([['https://elsewhere.invalid'], ['null'], ['http://localhost:1']])(
		'%s is refused as JSON and as a form',
		async (origin) => {
			const client = new Client(server.url);
			const json = await client.post('/api/sign-in', credentials(), { origin });
			const form = await client.form('/sign-in?/in', credentials(), { origin });
			expect([json.status, form.status, client.cookies.size]).toEqual([403, 403, 0]);
		}
	);

	it('is refused with a session too, and changes nothing', async () => {
		const before = (await administrator.get('/api/settings')).body;
		const change = { zone: 'Pacific/Auckland' };
		expect((await administrator.json('PATCH', '/api/settings', change, elsewhere)).status).toBe(403);
		expect((await administrator.get('/api/settings')).body).toEqual(before);
	});

	it('passes without Origin, as programs send, and with its own', async () => {
		const json = new Client(server.url);
		expect((await json.post('/api/sign-in', credentials())).status).toBe(200);
		expect((await json.post('/api/sign-in', credentials(), { origin: server.url })).status).toBe(200);
		const form = new Client(server.url);
		const bare = await form.request('POST', '/sign-in?/in', {
			body: new URLSearchParams(credentials()),
			headers: { accept: 'text/html' }
		});
		expect(bare.status).toBe(303);
		expect((await form.form('/sign-in?/in', credentials())).status).toBe(303);
	});

	it('is a safe one: it may read what anybody may', async () => {
		expect((await new Client(server.url).get('/api/clock', elsewhere)).status).toBe(200);
	});
});

describe('a one-time link', () => {
	let count = 0;
	async function invite() {
		const email = emailOf(`invited-${count++}`);
		const made = await administrator.post('/api/people', { name: 'Invited', email, roles: ['reviewer', 'surgeon'] });
		expect(made.status).toBe(201);
		return { email, id: made.body.person.id as string, link: made.body.link as string, made: made.body };
	}
	const use = (link: string, password = PASSWORD, client = new Client(server.url)) => client.form(link, { password });

	it('lasts a week and is shown with the account that it is for', async () => {
		const { made, id } = await invite();
		const days = (Date.parse(made.expiresAt) - Date.now()) / 86_400_000;
		expect(days).toBeGreaterThan(6.99);
		expect(days).toBeLessThanOrEqual(7);
		expect(made.person).toMatchObject({ id, roles: ['surgeon', 'reviewer'], joined: false, disabled: false });
	});

	it('sets the password, signs in and lands on the cases, once', async () => {
		const { link, email } = await invite();
		const client = new Client(server.url);
		expect((await client.get(link)).text).toContain(email);
		const used = await use(link, PASSWORD, client);
		expect([used.status, used.headers.get('location')]).toEqual([303, '/cases']);
		expect((await whoAmI(client)).status).toBe(200);
		expect((await signIn(email, PASSWORD)).status).toBe(200);
		expect((await use(link, 'another password of some length')).status).toBe(404);
		expect((await client.get(link)).text).toContain('This link was used already, or is too old.');
		expect((await signIn(email, PASSWORD)).status).toBe(200);
	});

	it('is used once by two at the same moment', async () => {
		const { link } = await invite();
		const statuses = (await Promise.all([use(link), use(link), use(link)])).map(({ status }) => status);
		expect(statuses.toSorted()).toEqual([303, 404, 404]);
	});

	// NIST SP 800-63B-4, section 3.1.1.2: at least 15 characters for a password alone, each code point one character.
	it.each([
		['fourteen chars', 422],
		['fifteen charact', 303],
		['🙂'.repeat(14), 422],
		['ä'.repeat(15), 303],
		['x'.repeat(64), 303],
		['x'.repeat(1025), 422]
	])('with the password %j answers %i', async (password, status) => {
		const { link } = await invite();
		const answer = await use(link, password);
		expect(answer.status).toBe(status);
		if (status === 422) expect((await use(link)).status).toBe(303);
	});

	it('says how many characters are missing', async () => {
		const { link } = await invite();
		expect((await use(link, 'short')).text).toContain('15 characters at least; these are 5.');
	});

	it('does not work when it is wrong or too old', async () => {
		expect((await use('/invitation/AAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAAA')).status).toBe(404);
		const { link, id } = await invite();
		inDatabase(
			'update invitations set expires_at = ? where account_id = ?',
			new Date(Date.now() - 1000).toISOString(),
			id
		);
		expect((await new Client(server.url).get(link)).status).toBe(404);
		expect((await use(link)).status).toBe(404);
	});

	it('made anew ends the one before; the old password holds until it is used, and then the old sessions end', async () => {
		const { link, id, email } = await invite();
		const client = new Client(server.url);
		await use(link, PASSWORD, client);
		const first = (await administrator.post(`/api/people/${id}/invitation`)).body.link as string;
		const second = await administrator.post(`/api/people/${id}/invitation`);
		expect(second.status).toBe(201);
		expect((await use(first)).status).toBe(404);
		expect((await signIn(email, PASSWORD)).status).toBe(200);
		expect((await whoAmI(client)).status).toBe(200);
		expect((await use(second.body.link, 'a password nobody forgets')).status).toBe(303);
		expect((await whoAmI(client)).status).toBe(401);
		expect((await signIn(email, PASSWORD)).status).toBe(401);
		expect((await signIn(email, 'a password nobody forgets')).status).toBe(200);
	});

	it('does not work for a disabled account, and none is made for it', async () => {
		const { link, id } = await invite();
		await administrator.json('PATCH', `/api/people/${id}`, { disabled: true });
		expect((await use(link)).status).toBe(404);
		expect((await administrator.post(`/api/people/${id}/invitation`)).status).toBe(409);
	});

	it('is kept only as its SHA-256', async () => {
		const { link } = await invite();
		const token = link.slice(link.lastIndexOf('/') + 1);
		expect(Buffer.from(token, 'base64url')).toHaveLength(32);
		const files = readdirSync(server.dataDir).map((file) => readFileSync(join(server.dataDir, file)));
		expect(files.some((bytes) => bytes.includes(emailOf('invited-0')))).toBe(true);
		expect(files.some((bytes) => bytes.includes(token))).toBe(false);
	});
});

describe('the link of the first administrator', () => {
	const given = { name: 'Ada', email: 'ada@clinic.invalid', password: PASSWORD };

	it('is printed at each start while nobody has an account; the one before dies', async () => {
		const first = await startServer();
		await first.stop();
		const second = await startServer({ dataDir: first.dataDir });
		const client = new Client(second.url);
		try {
			expect(first.setUp).toMatch(/^\/set-up\/[\w-]{43}$/);
			expect(second.setUp).not.toBe(first.setUp);
			expect((await client.form(first.setUp!, given)).status).toBe(404);
			const wrong = await client.form(second.setUp!, { ...given, name: ' ', email: 'ada', password: 'short' });
			expect(wrong.status).toBe(422);
			expect(wrong.text).toContain('value="ada"');
			const made = await client.form(second.setUp!, given);
			expect([made.status, made.headers.get('location')]).toEqual([303, '/cases']);
			expect((await client.get('/api/people')).body.people).toMatchObject([
				{ name: 'Ada', roles: ['administrator'], joined: true, linkUntil: null }
			]);
			expect((await client.form(second.setUp!, { ...given, email: 'eve@clinic.invalid' })).status).toBe(404);
			expect((await client.get(second.setUp!)).status).toBe(404);
		} finally {
			await second.stop();
		}
		const third = await startServer({ dataDir: first.dataDir });
		await third.discard();
		expect(third.setUp).toBeNull();
	});
});

describe('changing accounts', () => {
	const change = (id: string, what: unknown) => administrator.json('PATCH', `/api/people/${id}`, what);

	it('ends the session of a disabled account, which cannot sign in until it is enabled', async () => {
		const { id, email, client } = await newMember(server, members.administrator, 'leaver', ['examiner']);
		expect((await whoAmI(client)).status).toBe(200);
		expect((await change(id, { disabled: true })).body).toMatchObject({ id, disabled: true });
		expect((await whoAmI(client)).status).toBe(401);
		const refused = await signIn(email, PASSWORD);
		expect([refused.status, refused.body.error]).toEqual([401, 'The e-mail address or the password is wrong.']);
		const candidates = async () => (await administrator.get('/api/team-candidates')).body.people;
		expect(await candidates()).not.toContainEqual(expect.objectContaining({ id }));
		await change(id, { disabled: false });
		expect((await whoAmI(client)).status).toBe(401);
		expect((await signIn(email, PASSWORD)).status).toBe(200);
		expect(await candidates()).toContainEqual({ id, name: 'leaver', roles: ['examiner'] });
	});

	it('lets roles take effect at once', async () => {
		const { id, client } = await newMember(server, members.administrator, 'deputy', ['surgeon']);
		expect((await client.get('/api/people')).status).toBe(403);
		await change(id, { roles: ['administrator', 'surgeon'] });
		expect((await client.get('/api/people')).status).toBe(200);
		await change(id, { roles: ['surgeon'] });
		expect((await client.get('/api/people')).status).toBe(403);
	});

	it('keeps the last administrator who can sign in', async () => {
		const me = members.administrator.id;
		const waiting = await administrator.post('/api/people', {
			name: 'Never joined',
			email: 'waiting@clinic.invalid',
			roles: ['administrator']
		});
		for (const what of [{ disabled: true }, { roles: ['surgeon'] }]) expect((await change(me, what)).status).toBe(409);
		expect((await whoAmI(administrator)).status).toBe(200);
		expect((await change(waiting.body.person.id, { disabled: true })).status).toBe(200);
		const second = await newMember(server, members.administrator, 'second', ['administrator']);
		expect((await change(me, { roles: ['surgeon'] })).status).toBe(200);
		expect((await second.client.json('PATCH', `/api/people/${second.id}`, { disabled: true })).status).toBe(409);
		expect((await second.client.json('PATCH', `/api/people/${me}`, { roles: ['administrator'] })).status).toBe(200);
		expect((await change(second.id, { disabled: true })).status).toBe(200);
	});

	it('refuses what is not right, naming the field', async () => {
		const add = (what: object) =>
			administrator.post('/api/people', { name: 'New', email: 'new@clinic.invalid', roles: ['examiner'], ...what });
		expect((await add({ roles: [] })).body).toMatchObject({ fields: ['roles'] });
		expect((await add({ roles: ['owner'] })).status).toBe(422);
		expect((await add({ email: 'nowhere' })).body).toMatchObject({ fields: ['email'] });
		expect((await add({ name: '  ' })).body).toMatchObject({ fields: ['name'] });
		expect((await add({ disabled: true })).status).toBe(422);
		expect((await add({ email: members.surgeon.email.toUpperCase() })).status).toBe(409);
		expect((await change(members.surgeon.id, { email: 'other@clinic.invalid' })).status).toBe(422);
		expect((await change('nobody', { name: 'Nobody' })).status).toBe(404);
	});

	it('changes one’s own name and password; every other session ends, this one stays', async () => {
		const { email, client } = await newMember(server, members.administrator, 'changer', ['surgeon']);
		const elsewhere = new Client(server.url);
		await elsewhere.post('/api/sign-in', { email, password: PASSWORD });
		expect((await client.form('/account?/name', { name: 'Dr Changer' })).status).toBe(200);
		expect((await client.get('/account')).text).toContain('Dr Changer');
		const next = 'quite another password';
		const wrong = await client.form('/account?/password', { current: 'wrong', next });
		expect([wrong.status, wrong.text.includes('This is not your password.')]).toEqual([422, true]);
		expect((await client.form('/account?/password', { current: PASSWORD, next: 'short' })).status).toBe(422);
		expect((await whoAmI(elsewhere)).status).toBe(200);
		expect((await client.form('/account?/password', { current: PASSWORD, next })).status).toBe(200);
		expect((await whoAmI(client)).status).toBe(200);
		expect((await whoAmI(elsewhere)).status).toBe(401);
		expect((await signIn(email, PASSWORD)).status).toBe(401);
		expect((await signIn(email, next)).status).toBe(200);
	});
});

describe('an open stream of a case', () => {
	async function watching(name: string) {
		const member = await newMember(server, members.administrator, name, ['surgeon']);
		const made = await members.examiner.client.post('/api/cases', {
			hemisphere: 'left',
			languages: ['en'],
			team: [member.id, members.administrator.id]
		});
		const path = `/api/cases/${made.body.code}/stream`;
		const controller = new AbortController();
		const cookie = [...member.client.cookies].map(([key, value]) => `${key}=${value}`).join('; ');
		const response = await fetch(server.url + path, { headers: { cookie }, signal: controller.signal });
		expect(response.status).toBe(200);
		/** whether the server ends it within the milliseconds */
		const ends = async (within: number) => {
			const timer = setTimeout(() => controller.abort(), within);
			const ended = await response.text().then(
				() => true,
				() => false
			);
			clearTimeout(timer);
			return ended;
		};
		return { ...member, code: made.body.code as string, path, ends };
	}

	it('goes on while nothing changes for who reads it', async () => {
		const { ends } = await watching('steady');
		expect(await ends(1500)).toBe(false);
	});

	it('ends with the account, which is not let in again', async () => {
		const { id, client, path, ends } = await watching('stopped');
		await administrator.json('PATCH', `/api/people/${id}`, { disabled: true });
		expect(await ends(3000)).toBe(true);
		expect((await client.get(path)).status).toBe(401);
	});

	it('ends when its reader leaves the team', async () => {
		const { client, code, path, ends } = await watching('moved');
		expect((await administrator.json('PUT', `/api/cases/${code}/team`, { team: [members.examiner.id] })).status).toBe(
			200
		);
		expect(await ends(3000)).toBe(true);
		expect((await client.get(path)).status).toBe(404);
	});

	it('ends when its reader signs out', async () => {
		const { client, path, ends } = await watching('done');
		expect((await client.copy().post('/api/sign-out')).status).toBe(204);
		expect(await ends(3000)).toBe(true);
		expect((await client.get(path)).status).toBe(401);
	});
});

describe('the settings of the clinic', () => {
	it('take a time zone that exists, and no other', async () => {
		const set = (zone: unknown) => administrator.json('PATCH', '/api/settings', { zone });
		expect((await set('Europe/Berlin')).body).toEqual({ zone: 'Europe/Berlin' });
		for (const zone of ['Mars/Olympus', '', 7]) expect((await set(zone)).status).toBe(422);
		expect((await members.surgeon.client.get('/api/settings')).body).toEqual({ zone: 'Europe/Berlin' });
	});
});
