import type { Page } from '@playwright/test';
import { v7 } from 'uuid';
import type { CaseItem, EventData, EventType, LogEvent } from '../../src/lib/mapping/events';
import type { DisplayCommand, Layout } from '../../src/lib/stimuli/display';
import { DEFAULT_LAYOUT } from '../../src/lib/stimuli/display';
import type { Heard } from '../../src/lib/stimuli/presence';
import type { Client } from '../api/client';

type WithoutId<T> = T extends unknown ? Omit<T, 'id'> : never;
type Show = Extract<DisplayCommand, { kind: 'show' }>;

/** A case and its patient view, driven as an examiner's device drives them. */
export class PatientCase {
	private constructor(
		readonly client: Client,
		readonly code: string
	) {}

	static async make(client: Client, items: CaseItem[]): Promise<PatientCase> {
		const made = await client.post('/api/cases', { hemisphere: 'left', languages: ['en'] });
		if (made.status !== 201) throw new Error(made.text);
		const found = new PatientCase(client, made.body.code);
		await found.note('items-copied', {
			set: 'invented',
			version: '1',
			task: 'object-naming',
			language: 'en',
			leadIn: null,
			items
		});
		return found;
	}

	async note<T extends EventType>(type: T, data: EventData[T]): Promise<void> {
		const event = { id: v7(), type, v: 1, at: new Date().toISOString(), device: 'test', monotonic: 1, data };
		const stored = await this.client.post(`/api/cases/${this.code}/events`, { events: [event] });
		if (stored.status !== 200) throw new Error(stored.text);
	}

	async offer(): Promise<{ id: string; code: string; links: string[] }> {
		return (await this.client.post(`/api/cases/${this.code}/patient-view`)).body;
	}

	async confirm(id: string): Promise<void> {
		const confirmed = await this.client.json('PUT', `/api/cases/${this.code}/patient-view`, { id });
		if (confirmed.status !== 200) throw new Error(confirmed.text);
	}

	/**
	 * Opens the patient view by its link, confirms it, and waits until everything is loaded. Asks the page nothing: a
	 * question by the test driver counts as a touch for the browser. Gives the view's id.
	 */
	async pair(page: Page, origin = this.client.url): Promise<string> {
		const { id, code } = await this.offer();
		await page.goto(`${origin}/patient#${code}`);
		while ((await this.waiting())?.state !== 'claimed') await new Promise((done) => setTimeout(done, 50));
		await this.confirm(id);
		await this.heard(({ view, ready, total }) => view === id && total !== undefined && ready === total);
		return id;
	}

	/** The view that waits for a device or for the examiner's word. */
	async waiting(): Promise<{ id: string; state: string; checkWord: string | null } | null> {
		return (await this.client.get(`/api/cases/${this.code}/patient-view`)).body.waiting;
	}

	async serverNow(): Promise<number> {
		return (await this.client.get('/api/clock')).body.now;
	}

	/** Sends a message by the server; makes an id where it has none. */
	async send(message: WithoutId<DisplayCommand> | DisplayCommand): Promise<{ listening: number }> {
		const command = { id: v7(), ...message };
		for (let tries = 0; tries < 200; tries++) {
			const sent = await this.client.post(`/api/cases/${this.code}/display`, command);
			if (sent.status !== 200) throw new Error(sent.text);
			// A screen that was just paired begins to listen a moment later.
			if (sent.body.listening > 0) return sent.body;
			await new Promise((done) => setTimeout(done, 50));
		}
		throw new Error('no patient view listens');
	}

	async lay(layout: Partial<Layout>): Promise<void> {
		await this.send({ kind: 'layout', layout: { ...DEFAULT_LAYOUT, ...layout } });
	}

	/** server time at which the last message was to be shown */
	lastShowAt = 0;

	/**
	 * A message that shows something in a while, to be sent one way or another: far enough ahead for a machine that is
	 * busy, since what comes late is not shown.
	 */
	async showing(prompts: Show['prompts'], { ahead = 600, duration = null as number | null } = {}): Promise<Show> {
		this.lastShowAt = (await this.serverNow()) + ahead;
		return { id: v7(), kind: 'show', trial: v7(), showAt: this.lastShowAt, duration, prompts };
	}

	/** Shows something by the server; gives the presentation's name. */
	async show(prompts: Show['prompts'], when?: { ahead?: number; duration?: number | null }): Promise<string> {
		const message = await this.showing(prompts, when);
		await this.send(message);
		return message.trial;
	}

	async entries(): Promise<LogEvent[]> {
		return (await this.client.get(`/api/cases/${this.code}/events`)).body.events;
	}

	/** What the case log says became of a presentation; waits for it. */
	async onset(trial: string): Promise<EventData['trial-onset']> {
		for (let tries = 0; tries < 100; tries++) {
			const [onset] = await this.onsetsOf(trial);
			if (onset) return onset;
			await new Promise((done) => setTimeout(done, 50));
		}
		throw new Error('the case log does not say what became of the presentation');
	}

	async onsetsOf(trial: string): Promise<EventData['trial-onset'][]> {
		const onsets = (await this.entries()).filter(({ type }) => type === 'trial-onset');
		return onsets.map(({ data }) => data as EventData['trial-onset']).filter((data) => data.trial === trial);
	}

	/** Waits until the staff hear of the patient view what fits. */
	async heard(fits: (patient: Heard & { kind: 'patient' }) => boolean): Promise<Heard & { kind: 'patient' }> {
		const cookie = [...this.client.cookies].map(([name, value]) => `${name}=${value}`).join('; ');
		const stream = await fetch(`${this.client.url}/api/cases/${this.code}/stream`, {
			headers: { cookie },
			signal: AbortSignal.timeout(15_000)
		});
		let text = '';
		for await (const chunk of stream.body!.pipeThrough(new TextDecoderStream())) {
			text += chunk;
			const messages = text.split('\n\n');
			text = messages.pop() ?? '';
			for (const message of messages) {
				const [, data] = /^event: presence\ndata: (.*)$/m.exec(message) ?? [];
				const heard = data ? (JSON.parse(data) as Heard) : null;
				if (heard?.kind === 'patient' && fits(heard)) return heard;
			}
		}
		throw new Error('the stream ended');
	}
}
