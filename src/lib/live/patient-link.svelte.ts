import { v7 } from 'uuid';
import type { DisplayCommand, PatientPresence } from '$lib/stimuli/display';
import { patientChannel, type ChannelMessage, type PatientWord } from './patient-channel';
import { localNow } from './server-clock.svelte';

/** A message that takes longer than this to get through has no use any more; in milliseconds. */
const GIVE_UP = 1500;

type WithoutId<T> = T extends unknown ? Omit<T, 'id'> : never;

/** What became of a presentation, by the patient view's own word. */
export interface Shown {
	shown: boolean;
	reason?: string;
}

/**
 * The examiner's side of the patient view: a message goes both ways at once, straight to the other window of this
 * computer and through the server to any other device; the view takes the first of the two.
 */
export class PatientLink {
	/** the last presence said straight by the other window, and when, by this page's clock */
	presence = $state.raw<{ heardAt: number; presence: PatientPresence } | null>(null);
	/** what the view said of presentations, before the case log brings it */
	onsets = $state.raw<ReadonlyMap<string, Shown>>(new Map());
	/** why the server did not pass the last message on, or null */
	fault = $state<string | null>(null);

	#code: string;
	#sending: Promise<void> = Promise.resolve();
	#channel: BroadcastChannel;

	constructor(code: string, view: string) {
		this.#code = code;
		this.#channel = patientChannel(view);
		this.#channel.onmessage = ({ data }: MessageEvent<ChannelMessage>) => {
			if (data.to === 'staff') this.#hear(data.word);
		};
	}

	/** Sends a message by both ways and does not wait for either. */
	send(message: WithoutId<DisplayCommand>): void {
		const command = { ...message, id: v7() } as DisplayCommand;
		this.#channel.postMessage({ to: 'patient', command } satisfies ChannelMessage);
		// One after the other: an item must not come after the message that takes it off.
		this.#sending = this.#sending.then(() => this.#sendByServer(command));
	}

	close(): void {
		this.#channel.close();
	}

	async #sendByServer(command: DisplayCommand): Promise<void> {
		try {
			const response = await fetch(`/api/cases/${this.#code}/display`, {
				method: 'POST',
				headers: { 'content-type': 'application/json' },
				body: JSON.stringify(command),
				signal: AbortSignal.timeout(GIVE_UP)
			});
			this.fault = response.ok ? null : ((await response.json()) as { error: string }).error;
		} catch {
			this.fault = 'the server is not reached';
		}
	}

	#hear(word: PatientWord): void {
		if (word.kind === 'presence') this.presence = { heardAt: localNow(), presence: word };
		if (word.kind === 'onset') this.onsets = new Map(this.onsets).set(word.trial, word);
	}
}
