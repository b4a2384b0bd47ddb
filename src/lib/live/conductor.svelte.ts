import { v4 } from 'uuid';
import type { Trial } from '$lib/mapping/case-state';
import type { KeptItem } from '$lib/mapping/case-items';
import type { EventData } from '$lib/mapping/events';
import { RUNNING_TASKS, type Purpose, type Score } from '$lib/mapping/vocabulary';
import type { LiveCase, Note } from './live-case.svelte';
import type { PatientLink } from './patient-link.svelte';

/** What a trial is to be. */
export interface Presentation {
	/** null for a stimulation without language */
	item: KeptItem | null;
	task: string;
	language: string;
	tag: string | null;
	stimulated: boolean;
	milliamps: number | null;
}

/** How long the patient view has to say that it shows an item before the examiner is asked, in milliseconds. */
export const ONSET_DUE = 500;

/**
 * Runs trials: shows items on the patient view, and notes presentations, scores and what is taken back. Every entry
 * is saved on this device before anything is shown.
 */
export class Conductor {
	/** an earlier trial that somebody went back to */
	selected = $state<string | null>(null);
	/** what stands on the patient view now */
	showing = $state.raw<{ trial: string; item: string } | null>(null);
	/** presentations of this page whose onset nobody has told yet, with the time it was due at (server time) */
	#unconfirmed = $state.raw<ReadonlyMap<string, number>>(new Map());
	/** entries that took something back, the last first to come back */
	#takenBack = $state.raw<string[]>([]);

	constructor(
		readonly live: LiveCase,
		readonly purpose: Purpose,
		private readonly link: () => PatientLink | null
	) {}

	/** The open run of this purpose, or null before the first trial. */
	get run() {
		return [...this.live.state.runs.values()].findLast((run) => run.open && run.purpose === this.purpose) ?? null;
	}

	/** Whether another device leads the run: only the lead presents. */
	get isLedElsewhere(): boolean {
		const { run } = this;
		return run !== null && run.lead !== null && run.lead !== this.live.device;
	}

	/** The trials of this run's purpose, in log order. */
	get trials(): Trial[] {
		return [...this.live.state.trials.values()]
			.filter((trial) => trial.purpose === this.purpose)
			.sort((a, b) => a.order - b.order);
	}

	/**
	 * The trial that a score goes to, named large on the screen: one that was chosen, else the newest while it waits
	 * for its score. Otherwise none, so that a stray key scores nothing.
	 */
	get trial(): Trial | null {
		const chosen = this.selected === null ? undefined : this.live.state.trials.get(this.selected);
		if (chosen) return chosen;
		const newest = this.trials.at(-1);
		return newest && this.#waits(newest) ? newest : null;
	}

	/** An item shown during a pause does not count, but it is before the patient's eyes all the same. */
	#waits({ effect, score, excluded }: Trial): boolean {
		return effect.language === 'pending' || (score === null && excluded.every(({ why }) => why === 'pause'));
	}

	get canRedo(): boolean {
		return this.#takenBack.length > 0;
	}

	/** Takes over the run from the device that leads it. */
	async takeOver(): Promise<void> {
		const { run } = this;
		if (run) await this.live.note(['run-opened', { run: run.run, purpose: run.purpose, lead: this.live.device }]);
	}

	/** Opens a run of this purpose, unless one is open. */
	async openRun(): Promise<string> {
		const { run } = this;
		if (run) return run.run;
		const id = v4();
		await this.live.note(['run-opened', { run: id, purpose: this.purpose, lead: this.live.device }]);
		return id;
	}

	async closeRun(): Promise<void> {
		const { run } = this;
		if (run) await this.live.note(['run-closed', { run: run.run }]);
	}

	/**
	 * Starts a trial. In a running task whose prompt is on the screen already, the prompt stays and this marks a
	 * stimulation.
	 *
	 * @returns the id of the trial
	 */
	async present(presentation: Presentation): Promise<string> {
		const { item, task, language, tag, stimulated, milliamps } = presentation;
		const run = await this.openRun();
		const trial = v4();
		const { timing } = this.live.state.protocol;
		const stays = item !== null && RUNNING_TASKS.includes(task) && this.showing?.item === item.id;
		const showAt = this.live.clock.now() + timing.lead;
		const shows = item !== null && !stays;
		const noted: Note = [
			'trial-presented',
			{
				trial,
				item: item?.id ?? null,
				task,
				language,
				tag,
				stimulated,
				milliamps: stimulated ? milliamps : null,
				run,
				...(shows ? { showAt: new Date(showAt).toISOString() } : {})
			}
		];
		await this.live.note(noted);
		this.#takenBack = [];
		this.selected = null;
		if (!shows) return trial;
		const duration = RUNNING_TASKS.includes(task) ? null : timing.shown;
		this.showing = { trial, item: item.id };
		this.link()?.send({ kind: 'show', trial, showAt, duration, prompts: item.prompts });
		this.#unconfirmed = new Map(this.#unconfirmed).set(trial, showAt + ONSET_DUE);
		return trial;
	}

	/** Takes whatever is shown off the patient view. */
	blank(): void {
		this.showing = null;
		this.link()?.send({ kind: 'blank' });
	}

	/** Whether the patient saw a trial: true, false, or null while nobody has said so. */
	shown(trial: Trial): boolean | null {
		return trial.shown ?? this.link()?.onsets.get(trial.id)?.shown ?? null;
	}

	/** The newest presentation whose onset is overdue at `now`, server time: the examiner has to say. */
	overdue(now: number): Trial | null {
		const ids = [...this.#unconfirmed].filter(([, due]) => due <= now).map(([id]) => id);
		return (
			ids
				.map((id) => this.live.state.trials.get(id))
				.findLast((trial) => trial !== undefined && this.shown(trial) === null) ?? null
		);
	}

	/** The examiner says whether the patient saw the item. */
	async sayShown(trial: string, shown: boolean): Promise<void> {
		await this.live.note([
			'trial-onset',
			shown
				? { trial, shown, source: 'examiner' }
				: { trial, shown, source: 'examiner', reason: 'the examiner saw that it was not shown' }
		]);
	}

	/** Scores a trial, in place of every score that stands. */
	async score(trial: Trial, score: Score, more: Omit<Partial<EventData['trial-scored']>, 'trial'> = {}): Promise<void> {
		await this.live.note(['trial-scored', { ...more, trial: trial.id, score, corrects: trial.standing }]);
		this.#takenBack = [];
		this.selected = null;
		if (this.showing?.trial === trial.id && !RUNNING_TASKS.includes(trial.task)) this.blank();
	}

	/** Adds to the score that stands: what was said, a second kind, when it came. */
	async addToScore(trial: Trial, more: Partial<EventData['trial-scored']>): Promise<void> {
		if (!trial.score) return;
		await this.live.note(['trial-scored', { ...trial.score, ...more, trial: trial.id, corrects: trial.standing }]);
	}

	/**
	 * Takes back what this device did last: the last score and, called again, the trial.
	 *
	 * @returns what was taken back
	 */
	async takeBack(): Promise<'score' | 'trial' | null> {
		const last = this.#lastOwn();
		if (!last) return null;
		const [withdrawal] = await this.live.note(['entry-withdrawn', { entry: last.event.id }]);
		this.#takenBack = [...this.#takenBack, withdrawal!.id];
		if (last.event.type === 'trial-scored') {
			const { trial } = last.event.data;
			this.selected = trial === this.trials.at(-1)?.id ? null : trial;
			return 'score';
		}
		this.selected = null;
		this.blank();
		return 'trial';
	}

	/** Brings back what was taken back last. */
	async redo(): Promise<void> {
		const id = this.#takenBack.at(-1);
		if (id === undefined) return;
		await this.live.note(['entry-withdrawn', { entry: id }]);
		this.#takenBack = this.#takenBack.slice(0, -1);
		this.selected = null;
	}

	/** The newest standing score or presentation of this device in this run's purpose. */
	#lastOwn() {
		const { entries, trials } = this.live.state;
		const own = [...entries.values()].filter(({ event, withdrawn }) => {
			if (withdrawn || event.device !== this.live.device) return false;
			if (event.type !== 'trial-scored' && event.type !== 'trial-presented') return false;
			return trials.get(event.data.trial)?.purpose === this.purpose;
		});
		return own.reduce<(typeof own)[number] | null>(
			(last, entry) => (last && last.order > entry.order ? last : entry),
			null
		);
	}
}
