import type { LiveCase, Note } from '$lib/live/live-case.svelte';

/** Does something and returns what reverses it. */
export type Step = () => Promise<Step>;

/** The last change made on this page: it can be taken back, and put back again. */
export class Changes {
	last = $state.raw<{ label: string; takenBack: boolean } | null>(null);
	/** why the last change was not made; nothing was changed then */
	fault = $state<string | null>(null);
	busy = $state(false);
	#reverse: Step | null = null;

	constructor(private readonly live: LiveCase) {}

	/**
	 * Notes entries in the case log as one change.
	 *
	 * @returns whether they are saved
	 */
	async note(label: string, ...notes: Note[]): Promise<boolean> {
		return await this.make(label, async () => this.#withdrawing((await this.live.note(...notes)).map(({ id }) => id)));
	}

	/** Makes a change of any kind; whatever goes wrong is told in `fault`. */
	async make(label: string, step: Step): Promise<boolean> {
		return await this.#run(step, { label, takenBack: false });
	}

	/** Takes the last change back or, called again, puts it back. */
	async reverse(): Promise<void> {
		if (this.last && this.#reverse) {
			await this.#run(this.#reverse, { ...this.last, takenBack: !this.last.takenBack });
		}
	}

	async #run(step: Step, after: NonNullable<Changes['last']>): Promise<boolean> {
		if (this.busy) return false;
		this.busy = true;
		this.fault = null;
		try {
			this.#reverse = await step();
			this.last = after;
			return true;
		} catch (failure) {
			this.fault = failure instanceof Error ? failure.message : String(failure);
			return false;
		} finally {
			this.busy = false;
		}
	}

	/** The newest goes first, so that every withdrawal names an entry that still stands. */
	#withdrawing(ids: string[]): Step {
		return async () => {
			const notes = ids.toReversed().map((entry): Note => ['entry-withdrawn', { entry }]);
			return this.#withdrawing((await this.live.note(...notes)).map(({ id }) => id));
		};
	}
}
