import type { BrowserContext } from '@playwright/test';
import type { CaseItem, EventData, EventType, LogEvent } from '../../../src/lib/mapping/events';
import type { Client } from '../../api/client';
import { made } from '../../api/entries';
import { firstAdministrator, newMember, startServer, type Member, type Server } from '../../api/server';

/** A server of its own with those who work in theatre. */
export interface Clinic {
	server: Server;
	administrator: Member;
	examiner: Member;
	surgeon: Member;
}

export async function openClinic(): Promise<Clinic> {
	const server = await startServer();
	const administrator = await firstAdministrator(server);
	const examiner = await newMember(server, administrator, 'examiner', ['examiner']);
	const surgeon = await newMember(server, administrator, 'surgeon', ['surgeon']);
	return { server, administrator, examiner, surgeon };
}

/** The browser is signed in as somebody; a session by the form is tried with the accounts. */
export async function signIn(context: BrowserContext, { client }: Member): Promise<void> {
	await context.addCookies([...client.cookies].map(([name, value]) => ({ name, value, url: client.url })));
}

/** Items that are words on the screen: nothing has to be loaded for them. */
export function wordItems(answers: readonly string[], accepted: string[] = []): CaseItem[] {
	return answers.map((answer, index) => ({
		id: `item-${index + 1}`,
		answer,
		accepted,
		prompts: [{ kind: 'text', text: `picture of ${answer}` }]
	}));
}

export interface Prepared {
	tags: string[];
	sets: { task: string; language: string; items: CaseItem[] }[];
	/** the wait before an item is shown leaves a busy machine time to pass it on */
	timing?: EventData['protocol-set']['timing'];
	protocol?: EventData['protocol-set'];
	/** accounts that join the team */
	team?: Member[];
}

export const UNHURRIED = { shown: null, pause: 0, lead: 400 };

/** A case as it stands when the patient is awake. */
export class TheatreCase {
	private constructor(
		readonly client: Client,
		readonly code: string
	) {}

	static async prepare({ examiner, surgeon }: Clinic, given: Prepared): Promise<TheatreCase> {
		const { client } = examiner;
		const team = [surgeon, ...(given.team ?? [])].map(({ id }) => id);
		const languages = [...new Set(given.sets.map(({ language }) => language))];
		const made = await client.post('/api/cases', { hemisphere: 'left', languages, team });
		if (made.status !== 201) throw new Error(made.text);
		const found = new TheatreCase(client, made.body.code);
		await found.note(
			['protocol-set', { timing: given.timing ?? UNHURRIED, ...given.protocol }],
			...given.sets.map((set): Note => ['items-copied', { set: 'invented', version: '1', leadIn: null, ...set }]),
			...given.tags.map((tag): Note => ['tag-placed', { tag }])
		);
		return found;
	}

	/** Notes entries as another device would. */
	async note(...notes: Note[]): Promise<void> {
		const events = notes.map(([type, data]) => made(type, data as never, { device: 'another device' }));
		const stored = await this.client.post(`/api/cases/${this.code}/events`, { events });
		if (stored.status !== 200) throw new Error(stored.text);
	}

	async log(): Promise<LogEvent[]> {
		return (await this.client.get(`/api/cases/${this.code}/events`)).body.events;
	}

	async entries<T extends EventType>(type: T): Promise<EventData[T][]> {
		return (await this.log()).filter((event) => event.type === type).map(({ data }) => data as EventData[T]);
	}

	/** The trials presented so far, in order: item and tag. */
	async presented(): Promise<EventData['trial-presented'][]> {
		return await this.entries('trial-presented');
	}

	async map(): Promise<{ sites: Record<string, unknown>[]; tags: Record<string, unknown>[] }> {
		return (await this.client.get(`/api/cases/${this.code}/map`)).body;
	}
}

export type Note = { [T in EventType]: [type: T, data: EventData[T]] }[EventType];
