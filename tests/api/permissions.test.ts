import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Client, type Answer } from './client';
import { addressOf, routesInTree, type Route } from './routes';
import { newMember, ROLES, startServer, team, type Member, type Server } from './server';

/**
 * What each route answers, written by hand from DESIGN section 4 and apart from the table that the server asks. One
 * sign for each who asks, in this order:
 *
 *     nobody, patient view | therapist, examiner, neurophysiologist | surgeon, reviewer | administrator
 *
 *     + let through   1 sign in first (401, a page sends to sign-in)   3 not with this role   4 there is no such case
 *
 * For a route of one case there are two more: the same people for a case whose team they are not on, and for a code
 * that no case has.
 */
const EXPECTED: Record<string, [string, string?, string?]> = {
	'GET /': ['11 +++ ++ +'],
	'GET /(open)/sign-in': ['++ +++ ++ +'],
	'POST /(open)/sign-in': ['++ +++ ++ +'],
	'GET /(open)/invitation/[token]': ['++ +++ ++ +'],
	'POST /(open)/invitation/[token]': ['++ +++ ++ +'],
	'GET /(open)/set-up/[token]': ['++ +++ ++ +'],
	'POST /(open)/set-up/[token]': ['++ +++ ++ +'],
	'GET /(team)/account': ['11 +++ ++ +'],
	'POST /(team)/account': ['11 +++ ++ +'],
	'GET /(team)/cases': ['11 +++ ++ +'],
	'GET /(team)/cases/new': ['11 +++ 33 3'],
	'GET /(team)/cases/[code]': ['11 +++ ++ +', '11 444 44 +', '11 444 44 4'],
	'GET /(team)/cases/[code]/baseline': ['11 +++ 33 3', '11 444 44 4', '11 444 44 4'],
	'GET /(team)/cases/[code]/examiner': ['11 +++ 33 3', '11 444 44 4', '11 444 44 4'],
	'GET /(team)/cases/[code]/surgeon': ['11 +++ ++ 3', '11 444 44 4', '11 444 44 4'],
	'GET /(team)/library': ['11 +++ ++ +'],
	'GET /(team)/library/[set]': ['11 +++ ++ +'],
	'GET /(team)/people': ['11 333 33 +'],
	'GET /patient': ['++ +++ ++ +'],
	'GET /media/[file]': ['++ +++ ++ +'],
	'POST /api/sign-in': ['++ +++ ++ +'],
	'POST /api/sign-out': ['11 +++ ++ +'],
	'GET /api/clock': ['++ +++ ++ +'],
	'GET /api/people': ['11 333 33 +'],
	'POST /api/people': ['11 333 33 +'],
	'PATCH /api/people/[id]': ['11 333 33 +'],
	'POST /api/people/[id]/invitation': ['11 333 33 +'],
	'GET /api/settings': ['11 +++ ++ +'],
	'PATCH /api/settings': ['11 333 33 +'],
	'GET /api/library': ['11 +++ ++ +'],
	'GET /api/library/[set]': ['11 +++ ++ +'],
	'GET /api/team-candidates': ['11 +++ 33 +'],
	'GET /api/cases': ['11 +++ ++ +'],
	'POST /api/cases': ['11 +++ 33 3'],
	'GET /api/cases/[code]': ['11 +++ ++ +', '11 444 44 +', '11 444 44 4'],
	'PATCH /api/cases/[code]': ['11 +++ 33 3', '11 444 44 4', '11 444 44 4'],
	'PUT /api/cases/[code]/team': ['11 333 33 +', '11 444 44 +', '11 444 44 4'],
	'GET /api/cases/[code]/events': ['11 +++ ++ 3', '11 444 44 4', '11 444 44 4'],
	'POST /api/cases/[code]/events': ['11 +++ 33 3', '11 444 44 4', '11 444 44 4'],
	'GET /api/cases/[code]/stream': ['11 +++ ++ 3', '11 444 44 4', '11 444 44 4'],
	'GET /api/cases/[code]/map': ['11 +++ ++ 3', '11 444 44 4', '11 444 44 4'],
	'GET /api/cases/[code]/exports/trials.csv': ['11 +++ ++ 3', '11 444 44 4', '11 444 44 4'],
	'GET /api/cases/[code]/exports/sites.csv': ['11 +++ ++ 3', '11 444 44 4', '11 444 44 4'],
	'POST /api/cases/[code]/presence': ['11 +++ 33 3', '11 444 44 4', '11 444 44 4'],
	'POST /api/cases/[code]/display': ['11 +++ 33 3', '11 444 44 4', '11 444 44 4'],
	'GET /api/cases/[code]/patient-view': ['11 +++ 33 3', '11 444 44 4', '11 444 44 4'],
	'POST /api/cases/[code]/patient-view': ['11 +++ 33 3', '11 444 44 4', '11 444 44 4'],
	'PUT /api/cases/[code]/patient-view': ['11 +++ 33 3', '11 444 44 4', '11 444 44 4'],
	'DELETE /api/cases/[code]/patient-view': ['11 +++ 33 3', '11 444 44 4', '11 444 44 4'],
	'GET /api/patient/pairing': ['++ +++ ++ +'],
	'POST /api/patient/pairing': ['++ +++ ++ +'],
	'GET /api/patient/items': ['1+ 111 11 1'],
	'GET /api/patient/stream': ['1+ 111 11 1'],
	'POST /api/patient/events': ['1+ 111 11 1'],
	'POST /api/patient/presence': ['1+ 111 11 1']
};

/** These end what the others need: the pairing, the sessions. */
const LAST = ['DELETE /api/cases/[code]/patient-view', 'POST /api/sign-out'];

const WHO = ['nobody', 'patient view', ...ROLES] as const;

const nameOf = ({ method, id }: Route) => `${method} ${id}`;
const routes = routesInTree();
const known = routes
	.filter((route) => nameOf(route) in EXPECTED)
	.sort((a, b) => LAST.indexOf(nameOf(a)) - LAST.indexOf(nameOf(b)));

let server: Server;
let clients: Record<(typeof WHO)[number], Client>;
/** somebody on no team at all */
let outsider: Client;
/** codes of a case with all six on its team, of one that only somebody else is on, and of none */
let codes: [string, string, string];

beforeAll(async () => {
	server = await startServer();
	const members = await team(server);
	const own = await makeCase(members.therapist, Object.values(members));
	const stranger = await newMember(server, members.administrator, 'stranger', ['examiner']);
	const foreign = await makeCase(stranger, []);
	outsider = (await newMember(server, members.administrator, 'outsider', ['surgeon'])).client;
	codes = [own, foreign, 'nobo-dyha-00'];
	const patient = await pairedPatientView(members.examiner.client, own);
	clients = { nobody: new Client(server.url), 'patient view': patient } as typeof clients;
	for (const role of ROLES) clients[role] = members[role].client;
});
afterAll(() => server.discard());

async function makeCase(creator: Member, on: Member[]): Promise<string> {
	const answer = await creator.client.post('/api/cases', {
		hemisphere: 'left',
		languages: ['en'],
		team: on.map(({ id }) => id)
	});
	expect(answer.status).toBe(201);
	return answer.body.code;
}

async function pairedPatientView(examiner: Client, code: string): Promise<Client> {
	const device = new Client(server.url);
	const offered = await examiner.post(`/api/cases/${code}/patient-view`);
	const claimed = await device.post('/api/patient/pairing', { code: offered.body.code });
	expect(claimed.body.state).toBe('claimed');
	expect((await device.get('/api/patient/items')).status).toBe(401);
	const confirmed = await examiner.json('PUT', `/api/cases/${code}/patient-view`, { id: offered.body.id });
	expect(confirmed.body.state).toBe('confirmed');
	return device;
}

/** Asks with an empty body: who is let through meets the route's own checks and changes nothing. */
async function ask(route: Route, client: Client, code: string): Promise<Answer> {
	const path = addressOf(route.id, code);
	if (route.method === 'GET') return await client.get(path);
	return route.isPage ? await client.form(path, {}) : await client.json(route.method, path, {});
}

function signOf({ isPage, id }: Route, { status, headers }: Answer): string {
	if (isPage && status === 303 && headers.get('location')?.startsWith('/sign-in?to=')) return '1';
	if (status === 401) return '1';
	if (status === 403) return '3';
	// Elsewhere a 404 is the route's own: no such link, set or account.
	if (status === 404 && id.includes('[code]')) return '4';
	return status < 500 ? '+' : `(${status})`;
}

describe('every route of the file tree', () => {
	it('has an expectation, and every expectation a route', () => {
		expect(routes.map(nameOf).sort()).toEqual(Object.keys(EXPECTED).sort());
	});

	it('of one case has expectations for the case of another team and for none', () => {
		for (const [name, signs] of Object.entries(EXPECTED)) {
			expect([name, signs.length]).toEqual([name, name.includes('[code]') ? 3 : 1]);
		}
	});

	it.each(known.map((route) => [nameOf(route), route] as const))('%s', async (name, route) => {
		const asked = EXPECTED[name]!;
		const met: string[] = [];
		for (const code of codes.slice(0, asked.length)) {
			const signs: string[] = [];
			for (const who of WHO) signs.push(signOf(route, await ask(route, clients[who], code)));
			met.push(grouped(signs));
		}
		expect(met).toEqual(asked);
	});
});

function grouped(signs: string[]): string {
	return [signs.slice(0, 2), signs.slice(2, 5), signs.slice(5, 7), signs.slice(7)]
		.map((part) => part.join(''))
		.join(' ');
}

describe('the case of another team', () => {
	it.each(known.filter(({ id }) => id.includes('[code]')).map((route) => [nameOf(route), route] as const))(
		'%s says the same as for a case that does not exist',
		async (_, route) => {
			const [, foreign, none] = codes;
			const [one, other] = [await ask(route, outsider, foreign), await ask(route, outsider, none)];
			expect(one.status).toBe(404);
			expect({ status: other.status, text: other.text }).toEqual({ status: one.status, text: one.text });
			expect([...one.headers.keys()].sort()).toEqual([...other.headers.keys()].sort());
		}
	);
});
