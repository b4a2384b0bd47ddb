import { caseItems, preparedTasks, type KeptItem } from '$lib/mapping/case-items';
import type { Trial } from '$lib/mapping/case-state';
import { controlRates } from '$lib/mapping/controls';
import type { EventData, TaskLanguage } from '$lib/mapping/events';
import { nextItem, stayingItem, type Offer } from '$lib/mapping/offer';
import { shuffle } from '$lib/mapping/shuffle';
import { compareTags } from '$lib/mapping/sites';
import { RUNNING_TASKS, type ErrorKind, type Score } from '$lib/mapping/vocabulary';
import { v4 } from 'uuid';
import { Conductor } from './conductor.svelte';
import type { Command, KeyMeaning } from './keys';
import type { LiveCase, Note } from './live-case.svelte';
import type { PatientLink } from './patient-link.svelte';
import { chosenTag, typeTag, type TagEntry } from './tag-entry';

/** What the examiner is told in passing; it never stops a run. */
export type Hint =
	| 'choose-a-tag'
	| 'no-item'
	| 'nothing-to-score'
	| 'nothing-to-take-back'
	| 'nothing-to-move'
	| 'moved'
	| 'led-elsewhere'
	| 'score-taken-back'
	| 'trial-taken-back'
	| 'not-saved';

/** The one field that is open for typing, if any. */
export type OpenField = 'said' | 'current' | null;

const SEED_LIMIT = 2 ** 31;

/**
 * The examiner's desk in a mapping: what is chosen, what comes next, and what each command does. It decides nothing
 * about results; those are the case's state.
 */
export class Examiner {
	readonly conductor: Conductor;
	/** server time, moved on a few times a second */
	now = $state(0);
	milliamps = $state<number | null>(null);
	hint = $state<Hint | null>(null);
	field = $state<OpenField>(null);

	#live: LiveCase;
	#entry = $state.raw<TagEntry | null>(null);
	#task = $state.raw<TaskLanguage | null>(null);
	#skipped = $state.raw<ReadonlySet<string>>(new Set());
	#seed = $state(1);
	/** what was asked for and is not done yet */
	#doing: Promise<void> = Promise.resolve();
	/** what was said in a trial that has no score yet */
	#said = $state.raw<ReadonlyMap<string, string>>(new Map());

	constructor(
		live: LiveCase,
		private readonly link: () => PatientLink | null
	) {
		this.#live = live;
		this.conductor = new Conductor(live, 'mapping', link);
	}

	#items = $derived.by(() => caseItems(this.#live.state));
	#tasks = $derived(preparedTasks(this.#items));
	#ordered = $derived(shuffle(this.#items, this.#seed));
	#tags = $derived.by(() =>
		[...this.#live.state.tags.values()]
			.filter(({ placed }) => placed)
			.map(({ tag }) => tag)
			.sort(compareTags)
	);
	#trials = $derived.by(() => {
		void this.#live.state;
		return this.conductor.trials;
	});

	/** Tags that are laid, in order. */
	get tags(): string[] {
		return this.#tags;
	}

	get tasks(): TaskLanguage[] {
		return this.#tasks;
	}

	/** The task and language under test; the first that was prepared until another is chosen. */
	get task(): TaskLanguage | null {
		return this.#task ?? this.#tasks[0] ?? null;
	}

	/** Every item of the case, in the order it was copied. */
	get items(): KeptItem[] {
		return this.#items;
	}

	get trials(): Trial[] {
		return this.#trials;
	}

	/** Trials that wait for their score or for somebody to settle a contested one. */
	get unscored(): Trial[] {
		return this.#trials.filter((trial) => trial.effect.language === 'pending');
	}

	/** The trial a score would go to now, or null. */
	get trial(): Trial | null {
		void this.#trials;
		return this.conductor.trial;
	}

	/** Whether the trial that is named large waits for its score. */
	get isWaiting(): boolean {
		return this.trial !== null && this.trial.score === null;
	}

	get typed(): string {
		return this.#entry?.typed ?? '';
	}

	/** The tag that is chosen for the next trial. */
	get tag(): string | null {
		return chosenTag(this.#entry, this.#tags);
	}

	/** The item that comes next. */
	get offer(): Offer | null {
		const { task } = this;
		if (!task) return null;
		const { state } = this.#live;
		if (RUNNING_TASKS.includes(task.task)) {
			const showing = this.conductor.showing?.item ?? null;
			return stayingItem(state, this.#items, task, showing, this.#skipped);
		}
		return nextItem(state, this.#ordered, { ...task, tag: this.tag }, this.#skipped);
	}

	get lastStimulated(): Trial | null {
		return this.#trials.findLast((trial) => trial.stimulated) ?? null;
	}

	/** Milliseconds since the last stimulated trial, or null before the first. */
	get sinceStimulation(): number | null {
		return this.lastStimulated ? this.now - Date.parse(this.lastStimulated.at) : null;
	}

	/** The chosen tag was the last one stimulated: another should come between. */
	get isSameTagAgain(): boolean {
		return this.tag !== null && this.lastStimulated?.tag === this.tag;
	}

	/** Errors without stimulation in the task and language under test. */
	get controlRate(): { disturbed: number; valid: number } {
		const { task } = this;
		const rate = controlRates(this.#live.state).find(
			(found) => found.task === task?.task && found.language === task.language
		);
		return rate ?? { disturbed: 0, valid: 0 };
	}

	/** The pause that is open, or null. */
	get pause() {
		return [...this.#live.state.pauses.values()].findLast(({ to }) => to === Infinity) ?? null;
	}

	said(trial: Trial): string {
		return this.#said.get(trial.id) ?? trial.score?.said ?? '';
	}

	/**
	 * Does what a key says, once everything asked for before it is done: saving takes a moment, and a key pressed
	 * meanwhile is for what that leads to.
	 *
	 * @param meaning asked when its turn comes: what a key of the number pad means depends on what was done before it
	 */
	press(meaning: () => KeyMeaning | { score: Score } | null): Promise<void> {
		const pressedAt = performance.now();
		return this.#inTurn(async () => {
			const what = meaning();
			if (what === null) return;
			if ('tag' in what) return this.#type(what.tag, pressedAt);
			this.hint = null;
			if ('score' in what) await this.#score(what.score);
			else await this.#commands[what.do]();
		});
	}

	choose(tag: string | null): void {
		void this.#inTurn(() => {
			this.#entry = tag === null ? null : { typed: tag, at: -Infinity };
			this.hint = null;
		});
	}

	chooseTask(task: TaskLanguage): void {
		this.#task = task;
	}

	skip(): void {
		const { offer } = this;
		if (offer) this.#skipped = new Set(this.#skipped).add(offer.item.id);
	}

	shuffle(): void {
		this.#seed = crypto.getRandomValues(new Uint32Array(1))[0]! % SEED_LIMIT;
		this.#skipped = new Set();
	}

	/** Does what a command says; `hint` tells when there was nothing to do. */
	async do(command: Command): Promise<void> {
		await this.press(() => ({ do: command }));
	}

	/** Scores the trial that is named large. */
	async score(score: Score): Promise<void> {
		await this.press(() => ({ score }));
	}

	/** Takes over the run from the device that leads it. */
	async takeOver(): Promise<void> {
		this.hint = null;
		await this.#inTurn(() => this.conductor.takeOver());
	}

	/** Corrects what the trial that is named large was. */
	async correct(change: Omit<EventData['trial-corrected'], 'trial'>): Promise<void> {
		await this.#noteOnTrial((trial) => ['trial-corrected', { ...change, trial }]);
	}

	/** Leaves the trial that is named large out of the count. */
	async exclude(reason: string): Promise<void> {
		await this.#noteOnTrial((trial) => ['trial-excluded', { trial, reason }]);
	}

	#noteOnTrial(note: (trial: string) => Note): Promise<void> {
		return this.#inTurn(async () => {
			if (this.trial) await this.#live.note(note(this.trial.id));
		});
	}

	/** Keeps what the patient said: with the score, or until there is one. */
	async noteSaid(trial: Trial, said: string): Promise<void> {
		this.field = null;
		this.#said = new Map(this.#said).set(trial.id, said);
		await this.#inTurn(async () => {
			const now = this.#live.state.trials.get(trial.id);
			if (now?.score && (now.score.said ?? '') !== said) await this.conductor.addToScore(now, { said });
		});
	}

	#commands: Record<Command, () => Promise<void> | void> = {
		show: () => this.#show(true),
		control: () => this.#show(false),
		intact: () => this.#score('intact'),
		'take-back': () => this.#takeBack(),
		redo: () => this.conductor.redo(),
		said: () => this.#open('said'),
		current: () => this.#open('current'),
		move: () => this.#move(),
		skip: () => this.skip(),
		'next-task': () => this.#next('task', 'language'),
		'next-language': () => this.#next('language', 'task'),
		afterdischarge: () => this.#excludeLast('afterdischarge'),
		seizure: () => this.#seizure(),
		blank: () => this.conductor.blank(),
		earlier: () => this.#step(-1),
		later: () => this.#step(1),
		newest: () => {
			this.conductor.selected = null;
			this.field = null;
		},
		shown: () => this.#sayShown(true),
		'not-shown': () => this.#sayShown(false)
	};

	/** One thing after the other, in the order they were asked for; one that cannot be saved stops none after it. */
	#inTurn(work: () => Promise<void> | void): Promise<void> {
		this.#doing = this.#doing.then(work).catch(() => {
			this.hint = 'not-saved';
		});
		return this.#doing;
	}

	#type(character: string, at: number): void {
		this.#entry = typeTag(this.#entry, character, at, this.#tags);
		this.hint = null;
	}

	async #score(score: Score): Promise<void> {
		const { trial } = this;
		if (!trial) return this.#say('nothing-to-score');
		const said = this.said(trial);
		await this.conductor.score(trial, score, said ? { said } : {});
	}

	/** "That was eight, not seven": the trial that is named large was at the tag that is chosen. */
	async #move(): Promise<void> {
		const { trial, tag } = this;
		if (!trial) return this.#say('nothing-to-move');
		if (tag === null) return this.#say('choose-a-tag');
		await this.#live.note(['trial-corrected', { trial: trial.id, tag, stimulated: true }]);
		this.#entry = null;
		this.#say('moved');
	}

	async #show(stimulated: boolean): Promise<void> {
		const { task, offer, tag } = this;
		if (this.conductor.isLedElsewhere) return this.#say('led-elsewhere');
		if (stimulated && tag === null) return this.#say('choose-a-tag');
		if (!task || !offer) return this.#say('no-item');
		await this.conductor.present({
			...task,
			item: offer.item,
			tag: stimulated ? tag : null,
			stimulated,
			milliamps: this.milliamps
		});
		this.#entry = null;
	}

	async #takeBack(): Promise<void> {
		const taken = await this.conductor.takeBack();
		this.#say(taken === null ? 'nothing-to-take-back' : `${taken}-taken-back`);
	}

	#open(field: Exclude<OpenField, null>): void {
		if (field === 'said' && !this.trial) return this.#say('nothing-to-score');
		this.field = field;
	}

	/** The next pair of task and language that differs in one; the other stays where it can. */
	#next(changes: keyof TaskLanguage, stays: keyof TaskLanguage): void {
		const { task } = this;
		if (!task) return;
		const at = this.#tasks.findIndex((other) => other.task === task.task && other.language === task.language);
		const others = [...this.#tasks.slice(at + 1), ...this.#tasks.slice(0, at)].filter(
			(other) => other[changes] !== task[changes]
		);
		this.#task = others.find((other) => other[stays] === task[stays]) ?? others[0] ?? task;
	}

	async #excludeLast(reason: ErrorKind): Promise<void> {
		const last = this.lastStimulated;
		if (!last) return this.#say('nothing-to-score');
		await this.#live.note(['trial-excluded', { trial: last.id, reason }]);
		this.conductor.blank();
	}

	/** The first press stops the count and tells what to do; the second goes on. */
	async #seizure(): Promise<void> {
		const { pause, lastStimulated } = this;
		if (pause) {
			await this.#live.note(['pause-closed', { pause: pause.pause }]);
			return;
		}
		this.conductor.blank();
		const opened: Note = ['pause-opened', { pause: v4(), reason: 'seizure' }];
		if (!lastStimulated) await this.#live.note(opened);
		else await this.#live.note(['trial-excluded', { trial: lastStimulated.id, reason: 'seizure' }], opened);
	}

	#step(by: number): void {
		const { trial } = this;
		const at = trial ? this.#trials.findIndex(({ id }) => id === trial.id) : this.#trials.length;
		const next = this.#trials[at + by];
		if (next) this.conductor.selected = next.id;
	}

	async #sayShown(shown: boolean): Promise<void> {
		const overdue = this.conductor.overdue(this.now);
		if (overdue) await this.conductor.sayShown(overdue.id, shown);
	}

	#say(hint: Hint): void {
		this.hint = hint;
	}
}
