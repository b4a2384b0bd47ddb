import { Conductor } from '$lib/live/conductor.svelte';
import type { LiveCase } from '$lib/live/live-case.svelte';
import type { PatientLink } from '$lib/live/patient-link.svelte';
import { baselineItems, baselineRounds, nextInRound, type BaselineItem } from '$lib/mapping/baseline';
import type { KeptItem } from '$lib/mapping/case-items';
import type { Trial } from '$lib/mapping/case-state';
import type { Score } from '$lib/mapping/vocabulary';
import { BASELINE } from '$lib/messages/baseline';
import { SvelteSet } from 'svelte/reactivity';

/** One baseline round as its page runs it: which item comes next, and what each key does. */
export class BaselineRound {
	readonly conductor: Conductor;
	/** what the patient said, for the next score */
	said = $state('');
	/** what the therapist is told in passing */
	hint = $state<string | null>(null);

	#skipped = new SvelteSet<string>();
	#busy = false;

	constructor(
		private readonly live: LiveCase,
		private readonly link: () => PatientLink | null
	) {
		this.conductor = new Conductor(live, 'baseline', link);
	}

	#items = $derived.by(() => baselineItems(this.live.state));
	#run = $derived.by(() => this.conductor.run);
	#index = $derived.by(() => (this.#run ? baselineRounds(this.live.state).indexOf(this.#run.run) : -1));
	/** the trial of this round that waits for its score */
	#trial = $derived.by((): Trial | null => {
		const last = this.conductor.trials.findLast(({ run }) => run === this.#run?.run);
		return last && !last.score && last.excluded.length === 0 ? last : null;
	});

	get items(): BaselineItem[] {
		return this.#items;
	}

	get isOpen(): boolean {
		return this.#run !== null;
	}

	/** From 1: of the open round, or of the one that would be opened next. */
	get number(): number {
		return this.isOpen ? this.#index + 1 : baselineRounds(this.live.state).length + 1;
	}

	get trial(): Trial | null {
		return this.#trial;
	}

	/** The item that stands on the desk: the one that waits for its score, else the next. */
	get item(): KeptItem | null {
		const trial = this.#trial;
		if (!trial) return nextInRound(this.#items, this.#index, this.#skipped)?.item ?? null;
		const shown = this.#items.find(
			({ item }) => item.id === trial.item && item.task === trial.task && item.language === trial.language
		);
		return shown?.item ?? null;
	}

	/** How many of the kept items have their answer in this round. */
	get progress(): { done: number; all: number } {
		const kept = this.#items.filter(({ item }) => item.kept);
		const done = kept.filter(({ rounds }) => ['right', 'wrong'].includes(rounds[this.#index]?.answer ?? ''));
		return { done: done.length, all: kept.length };
	}

	async begin(): Promise<void> {
		await this.#do(async () => {
			this.#skipped.clear();
			await this.conductor.openRun();
		});
	}

	async end(): Promise<void> {
		await this.#do(async () => {
			this.conductor.blank();
			await this.conductor.closeRun();
		});
	}

	async show(): Promise<void> {
		await this.#do(async () => {
			if (this.#trial) this.hint = BASELINE.alreadyShown;
			else await this.#present();
		});
	}

	/** By hand the press that scores is the first word of the trial; with a patient view the item is shown before. */
	async score(score: Score): Promise<void> {
		await this.#do(async () => {
			if (!this.#trial && this.link() !== null) {
				this.hint = BASELINE.showFirst;
				return;
			}
			if (!this.#trial) await this.#present();
			const trial = this.#trial;
			if (!trial) return;
			const said = this.said.trim();
			await this.conductor.score(trial, score, said === '' ? {} : { said });
			this.said = '';
		});
	}

	async takeBack(): Promise<void> {
		await this.#do(async () => {
			const taken = await this.conductor.takeBack();
			const hints = { score: BASELINE.scoreTakenBack, trial: BASELINE.trialTakenBack };
			this.hint = taken === null ? BASELINE.nothingToTakeBack : hints[taken];
		});
	}

	/** Answers for a patient view that has not confirmed its last item. */
	async sayShown(now: number, shown: boolean): Promise<void> {
		await this.#do(async () => {
			const overdue = this.link() === null ? null : this.conductor.overdue(now);
			if (overdue) await this.conductor.sayShown(overdue.id, shown);
		});
	}

	skip(): void {
		const { item } = this;
		if (item && !this.#trial) this.#skipped.add(item.id);
	}

	async #present(): Promise<void> {
		const { item } = this;
		if (!item || this.conductor.isLedElsewhere) return;
		const { task, language } = item;
		await this.conductor.present({ item, task, language, tag: null, stimulated: false, milliamps: null });
	}

	/** One thing after the other: a second press while the first is being saved does nothing. */
	async #do(act: () => Promise<void>): Promise<void> {
		if (this.#busy) return;
		this.#busy = true;
		this.hint = null;
		try {
			await act();
		} catch (failure) {
			this.hint = BASELINE.notSaved(failure instanceof Error ? failure.message : String(failure));
		} finally {
			this.#busy = false;
		}
	}
}
