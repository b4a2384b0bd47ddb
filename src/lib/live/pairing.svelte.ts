import { readCode } from '$lib/stimuli/pairing-code';

interface PairingAnswer {
	view: string | null;
	state: 'none' | 'offered' | 'claimed' | 'confirmed' | 'ended';
	checkWord: string | null;
}

const ADDRESS = '/api/patient/pairing';
const ASK_EVERY = 1000;

/** Asks the server how far this screen is with pairing; null when it is not reached. */
export async function askPairing(): Promise<PairingAnswer | null> {
	try {
		const response = await fetch(ADDRESS, { cache: 'no-store' });
		return response.ok ? ((await response.json()) as PairingAnswer) : null;
	} catch {
		return null;
	}
}

/** The way of a screen to its case: a code, then the examiner's word. */
export class Pairing {
	step = $state<'asking' | 'code' | 'waiting' | 'paired'>('asking');
	/** the id of the view, once paired */
	view = $state<string | null>(null);
	/** what both screens show while the examiner's word is awaited */
	checkWord = $state<string | null>(null);
	/** why the last code was not taken, in the server's words; `not-reached` when it was not reached */
	refusal = $state<string | 'not-reached' | null>(null);
	/** the examiner has ended this view, or did not take it */
	ended = $state(false);
	#timer: ReturnType<typeof setTimeout> | undefined;

	/** Begins with the code of a link, or with what this browser was paired with before. */
	async begin(text: string): Promise<void> {
		const code = readCode(text);
		if (code && (await this.give(code))) return;
		await this.#ask();
	}

	/** Gives a code; true when the server took it. */
	async give(code: string): Promise<boolean> {
		this.refusal = null;
		this.ended = false;
		const answer = await send(code);
		if (typeof answer === 'string') this.refusal = answer;
		else this.#hear(answer);
		return typeof answer !== 'string';
	}

	/** Goes back to the code, for another one. */
	restart({ ended }: { ended: boolean }): void {
		clearTimeout(this.#timer);
		this.ended = ended;
		this.view = null;
		this.step = 'code';
	}

	stop(): void {
		clearTimeout(this.#timer);
	}

	async #ask(): Promise<void> {
		const answer = await askPairing();
		if (answer) this.#hear(answer);
		else this.#askAgain();
	}

	#askAgain(): void {
		clearTimeout(this.#timer);
		this.#timer = setTimeout(() => void this.#ask(), ASK_EVERY);
	}

	#hear({ view, state, checkWord }: PairingAnswer): void {
		this.checkWord = checkWord;
		if (state === 'confirmed') {
			this.view = view;
			this.step = 'paired';
		} else if (state === 'claimed') {
			this.step = 'waiting';
			this.#askAgain();
		} else {
			this.restart({ ended: this.step === 'waiting' });
		}
	}
}

async function send(code: string): Promise<PairingAnswer | string> {
	try {
		const response = await fetch(ADDRESS, {
			method: 'POST',
			headers: { 'content-type': 'application/json' },
			body: JSON.stringify({ code })
		});
		const answer: unknown = await response.json();
		return response.ok ? (answer as PairingAnswer) : (answer as { error: string }).error;
	} catch {
		return 'not-reached';
	}
}
