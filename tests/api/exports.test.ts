import { execFile } from 'node:child_process';
import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { promisify } from 'node:util';
import { parse } from 'csv-parse/sync';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { readStrictly } from '../unit/results/strict-csv';
import { made, newCase, trials } from './entries';
import { startServer, team, type Member, type RoleName, type Server } from './server';

let server: Server;
let members: Record<RoleName, Member>;
let code: string;

beforeAll(async () => {
	server = await startServer();
	members = await team(server);
	const { examiner, surgeon, reviewer } = members;
	code = await newCase(examiner, surgeon, reviewer);
	const noted = trials([null]);
	const [presented] = noted;
	const trial = (presented?.data as { trial: string }).trial;
	const events = [
		...trials(['anomia', 'intact', 'anomia']),
		...trials(['intact', 'intact', 'intact', 'intact'], { stimulated: false, tag: null, milliamps: null }),
		...noted,
		made('trial-scored', { trial, score: 'delay', corrects: [], said: '=HYPERLINK("x")', note: '@home\r\n"late"' })
	];
	const { status, text } = await examiner.client.post(`/api/cases/${code}/events`, { events });
	if (status !== 200) throw new Error(text);
	const zone = await members.administrator.client.json('PATCH', '/api/settings', { zone: 'Asia/Kathmandu' });
	if (zone.status >= 300) throw new Error(zone.text);
});
afterAll(() => server.discard());

const path = (name: string) => `/api/cases/${code}/exports/${name}.csv`;

function tableOf(text: string): Record<string, string>[] {
	return parse(text, { columns: true, record_delimiter: '\r\n' }) as Record<string, string>[];
}

describe.each(['trials', 'sites'])('the file of %s', (name) => {
	it('is CSV to be kept under the code of the case', async () => {
		const { status, headers, text } = await members.surgeon.client.get(path(name));
		expect(status).toBe(200);
		expect(headers.get('content-type')).toBe('text/csv; charset=utf-8');
		expect(headers.get('content-disposition')).toBe(`attachment; filename="${code}-${name}.csv"`);
		const [header = [], ...rows] = readStrictly(text);
		expect(rows.length).toBeGreaterThan(0);
		expect(tableOf(text)).toEqual(
			rows.map((row) => Object.fromEntries(header.map((column, index) => [column, row[index]])))
		);
	});

	it('is for the team, and for nobody who is not on it', async () => {
		expect((await members.reviewer.client.get(path(name))).status).toBe(200);
		expect((await members.therapist.client.get(path(name))).status).toBe(404);
		expect((await members.administrator.client.get(path(name))).status).toBe(404);
	});
});

describe('the trials of a case', () => {
	it('are written in the zone of the clinic and without a formula', async () => {
		const rows = tableOf((await members.surgeon.client.get(path('trials'))).text);
		expect(rows).toHaveLength(8);
		// Noon at +01:00 is 16:45 in Kathmandu, UTC+05:45 by the IANA time zone database.
		expect(rows[0]).toMatchObject({ case: code, position: '1', at: '2031-03-05T16:45:00.000+05:45', tag: '7' });
		expect(rows[7]).toMatchObject({ said: `'=HYPERLINK("x")`, note: `'@home\r\n"late"`, by: members.examiner.id });
	});

	it('rescored give the verdicts of the map', async () => {
		const file = join(server.dataDir, 'trials.csv');
		writeFileSync(file, (await members.surgeon.client.get(path('trials'))).text);
		const { stdout } = await promisify(execFile)('npm', ['run', '--silent', 'rescore', '--', file]);
		const { body } = await members.surgeon.client.get(`/api/cases/${code}/map`);
		expect(body.sites).toHaveLength(1);
		expect(tableOf(stdout)).toEqual(
			body.sites.map((site: Record<string, unknown>) => ({
				tag: site.tag,
				task: site.task,
				language: site.language,
				disturbed: String(site.disturbed),
				valid: String(site.valid),
				excluded: String(site.excluded),
				verdict: site.verdict
			}))
		);
		expect(tableOf(stdout)[0]).toMatchObject({ disturbed: '2', valid: '4', verdict: 'negative' });
	});
});
