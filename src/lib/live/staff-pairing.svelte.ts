import { EXAMINER } from '$lib/messages/examiner';

/** A patient view as the staff see it. */
export interface PairedView {
	id: string;
	state: 'offered' | 'claimed' | 'confirmed' | 'ended';
	/** shown on both screens */
	checkWord: string | null;
}

export interface Offer {
	id: string;
	code: string;
	expiresAt: string;
	/** addresses with the code, those that other devices reach first */
	links: string[];
}

/** Pairing a patient view with a case, from the examiner's side. */
export class StaffPairing {
	active = $state.raw<PairedView | null>(null);
	waiting = $state.raw<PairedView | null>(null);
	offer = $state.raw<Offer | null>(null);
	fault = $state<string | null>(null);

	#url: string;

	constructor(code: string, views: { active: PairedView | null; waiting: PairedView | null }) {
		this.#url = `/api/cases/${code}/patient-view`;
		this.active = views.active;
		this.waiting = views.waiting;
	}

	/** Offers a new code. */
	async begin(): Promise<void> {
		this.offer = await this.#ask<Offer>('POST');
	}

	/** Opens the patient view in a second window of this computer. */
	openHere(): void {
		if (this.offer) window.open(`/patient#${this.offer.code}`, 'wordkeep-patient', 'popup,width=1280,height=800');
	}

	/** Asks how far pairing is; call it when the stream says that there is news. */
	async refresh(): Promise<void> {
		const views = await this.#ask<{ active: PairedView | null; waiting: PairedView | null }>('GET');
		if (!views) return;
		if (views.active?.id !== this.active?.id) this.active = views.active;
		this.waiting = views.waiting;
		if (this.waiting === null || this.waiting.id !== this.offer?.id) this.offer = null;
	}

	/** Says that the device that waits is the right one. */
	async confirm(): Promise<void> {
		if (!this.waiting) return;
		const confirmed = await this.#ask<PairedView>('PUT', { id: this.waiting.id });
		if (confirmed) await this.refresh();
	}

	async end(): Promise<void> {
		await this.#ask('DELETE');
		await this.refresh();
	}

	async #ask<T>(method: string, body?: unknown): Promise<T | null> {
		try {
			const response = await fetch(this.#url, {
				method,
				...(body === undefined ? {} : { body: JSON.stringify(body), headers: { 'content-type': 'application/json' } })
			});
			const answer = response.status === 204 ? null : ((await response.json()) as T & { error?: string });
			this.fault = response.ok ? null : (answer?.error ?? response.statusText);
			return response.ok ? answer : null;
		} catch {
			this.fault = EXAMINER.serverGone;
			return null;
		}
	}
}
