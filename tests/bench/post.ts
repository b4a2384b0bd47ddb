import { Agent, request } from 'node:http';
import { v4 } from 'uuid';
import { cookieOf, made } from '../api/entries';
import { startBare } from './bare/start';
import { openClinic } from './clinic';
import type { Sample } from './distribution';
import type { Plan } from './plan';
import { PORTS } from './ports';
import { distributionColumns, distributionRow, heading, ratioRow } from './report';

const A_RUN = 300;
const WARM_UP = 60;
/** Each server hears of an entry 20 times a second, half a turn after the other. */
const HALF_TURN = 25;
const MOST = 3;

/** One scored trial a request, from one client that is signed in, until the answer that it is on disk. */
export async function post({ runs, share }: Plan): Promise<void> {
	const clinic = await openClinic();
	const bare = await startBare('insert-server', PORTS.bare);
	const code = await clinic.newCase();
	const wordkeepSend = sender(`${clinic.server.url}/api/cases/${code}/events`, cookieOf(clinic.examiner.client));
	const bareSend = sender(`${bare.url}/events`, {});
	const measured = { wordkeep: [] as Sample[], bare: [] as Sample[] };
	try {
		await interleave(WARM_UP, wordkeepSend, bareSend);
		for (let run = 0; run < runs; run++) {
			const [ours, theirs] = await interleave(Math.round(A_RUN * share), wordkeepSend, bareSend);
			measured.wordkeep.push(ours);
			measured.bare.push(theirs);
		}
	} finally {
		await bare.discard();
		await clinic.server.discard();
	}

	heading('post: one entry to its durable answer, 20 a second, beside a bare Node and SQLite insert server');
	distributionColumns('ms');
	distributionRow('Wordkeep', measured.wordkeep);
	distributionRow('bare insert server', measured.bare);
	ratioRow('ratio', measured, MOST);
}

type Send = () => Promise<number>;

async function interleave(times: number, first: Send, second: Send): Promise<[Sample, Sample]> {
	const samples: [Sample, Sample] = [[], []];
	const begun = performance.now();
	for (let turn = 0; turn < times * 2; turn++) {
		const early = begun + turn * HALF_TURN - performance.now();
		if (early > 0) await new Promise((done) => setTimeout(done, early));
		samples[turn % 2]!.push(await (turn % 2 === 0 ? first() : second()));
	}
	return samples;
}

/** Sends an entry over one connection that stays open; says how many milliseconds the answer took. */
function sender(url: string, headers: Record<string, string>): Send {
	const agent = new Agent({ keepAlive: true, maxSockets: 1 });
	return () => {
		const entry = made('trial-scored', { trial: v4(), score: 'intact', corrects: [] });
		const body = JSON.stringify({ events: [{ ...entry, at: new Date().toISOString() }] });
		return new Promise((done, failed) => {
			const begun = performance.now();
			const sent = request(
				url,
				{
					method: 'POST',
					agent,
					headers: { ...headers, 'content-type': 'application/json', 'content-length': Buffer.byteLength(body) }
				},
				(response) => {
					let text = '';
					response.setEncoding('utf8').on('data', (chunk) => (text += chunk));
					response.on('end', () => {
						const took = performance.now() - begun;
						const stored: unknown = response.statusCode === 200 && JSON.parse(text).stored;
						if (Array.isArray(stored) && stored.length === 1) done(took);
						else failed(new Error(`${url} answered ${response.statusCode}: ${text}`));
					});
				}
			);
			sent.on('error', failed);
			sent.end(body);
		});
	};
}
