import type { EventData } from '$lib/mapping/events';
import type { DisplayCommand } from '$lib/stimuli/display';
import { atFrame, LONGEST_WAIT, onArrival, type Frame } from '$lib/stimuli/display-time';
import type { NotShown } from '$lib/stimuli/not-shown';
import { instantOf } from './instant';
import type { MediaLibrary } from './media-library.svelte';
import { OnsetTiming } from './onset-timing';
import type { ServerClock } from './server-clock.svelte';
import type { Playing, SoundOutput } from './sound-output';
import { makeElements, type Stage } from './stage';

type Show = Extract<DisplayCommand, { kind: 'show' }>;

/** A presentation whose time has not come. Times by `performance.now()`. */
interface Waiting {
	show: Show;
	due: number;
	/** what it puts on the screen; null until it is decoded */
	elements: HTMLElement[] | null;
	playing: Playing[];
	timer: ReturnType<typeof setTimeout>;
}

interface Ports {
	clock: ServerClock;
	media: MediaLibrary;
	/** asked for when something is to be heard */
	sound: () => Promise<SoundOutput>;
	stage: Stage;
	/** takes what became of each presentation, once */
	report(onset: EventData['trial-onset']): void;
}

const SIXTY_HERTZ = 1000 / 60;
const LATENCIES = 15;

/**
 * Shows each item at its time or not at all. A loop of animation frames runs always: the frame nearest to the time puts
 * the item in, and the next ones take it off when its time on the screen is over.
 */
export class Presenter {
	/** time stamp of the last animation frame */
	lastFrame = performance.now();

	#ports: Ports;
	#timing = new OnsetTiming();
	#waiting: Waiting[] = [];
	#current: { off: number | null; playing: Playing[] } | null = null;
	#interval = SIXTY_HERTZ;
	#latencies: number[] = [];
	#handle = 0;

	constructor(ports: Ports) {
		this.#ports = ports;
		this.#handle = requestAnimationFrame(this.#frame);
		document.addEventListener('visibilitychange', this.#onVisibility);
	}

	stop(): void {
		cancelAnimationFrame(this.#handle);
		document.removeEventListener('visibilitychange', this.#onVisibility);
		this.giveUp('taken-off');
		this.#timing.stop();
	}

	show(show: Show): void {
		const now = performance.now();
		const due = this.#ports.clock.moment(show.showAt);
		const verdict = document.hidden ? 'hidden' : onArrival(due, now, this.#interval);
		if (verdict !== 'take') return this.#reportMissed(show, verdict);
		const waiting: Waiting = {
			show,
			due,
			elements: null,
			playing: [],
			timer: setTimeout(
				() => this.#drop(waiting, document.hidden ? 'hidden' : waiting.elements ? 'no-frame' : 'media'),
				due - now + LONGEST_WAIT + this.#interval
			)
		};
		this.#waiting.push(waiting);
		this.#prepare(waiting).catch(() => this.#drop(waiting, 'media'));
	}

	/** Takes off what is on the screen and forgets what was to come. */
	giveUp(reason: NotShown): void {
		for (const waiting of [...this.#waiting]) this.#drop(waiting, reason);
		this.#clear();
	}

	async #prepare(waiting: Waiting): Promise<void> {
		const { media, sound } = this.#ports;
		const { prompts, trial } = waiting.show;
		const files = prompts.flatMap((prompt) => (prompt.kind === 'sound' ? [prompt.file] : []));
		const [elements, buffers, output] = await Promise.all([
			makeElements(prompts, trial, (pictures) => media.picture(pictures)),
			Promise.all(files.map((file) => media.sound(file))),
			files.length > 0 ? sound() : null
		]);
		if (!this.#waiting.includes(waiting)) return;
		if (output && !output.running) return this.#drop(waiting, 'sound-off');
		waiting.elements = elements;
		waiting.playing = output ? buffers.map((buffer) => output.play(buffer, waiting.due)) : [];
	}

	#frame = (stamp: number): void => {
		this.#handle = requestAnimationFrame(this.#frame);
		const passed = stamp - this.lastFrame;
		if (passed > 3 && passed < 50) this.#interval += (passed - this.#interval) / 10;
		this.lastFrame = stamp;
		try {
			this.#step({ stamp, interval: this.#interval, latency: median(this.#latencies) ?? this.#interval / 2 });
		} catch (failure) {
			this.giveUp('fault');
			console.error(failure);
		}
	};

	#step(frame: Frame): void {
		const off = this.#current?.off ?? null;
		if (off !== null && atFrame(off, frame) !== 'wait') this.#clear();
		const due: Waiting[] = [];
		for (const waiting of [...this.#waiting]) {
			const verdict = atFrame(waiting.due, frame);
			if (verdict === 'gone') this.#drop(waiting, waiting.elements ? 'no-frame' : 'media');
			else if (verdict === 'now' && waiting.elements) due.push(waiting);
		}
		// Two at once: the one that was to come later is what would be seen.
		due.sort((a, b) => a.due - b.due);
		for (const overtaken of due.slice(0, -1)) this.#drop(overtaken, 'taken-off');
		const last = due.at(-1);
		if (last) this.#put(last, frame);
	}

	#put(waiting: Waiting, { stamp, latency }: Frame): void {
		this.#forget(waiting);
		this.#clear();
		const { show, elements, playing, due } = waiting;
		const visible = elements ?? [];
		if (visible.length > 0) this.#ports.stage.put(visible);
		const on = visible.length > 0 ? stamp + latency : due;
		this.#current = { off: show.duration === null ? null : on + show.duration, playing };
		void (visible.length > 0 ? this.#reportSeen(show, stamp) : this.#reportHeard(show, playing));
	}

	async #reportSeen(show: Show, stamp: number): Promise<void> {
		const { moment, source } = await this.#timing.measure(show.trial, stamp);
		if (source === 'presentation-time') this.#latencies = [...this.#latencies, moment - stamp].slice(-LATENCIES);
		this.#report(show, { shown: true, measured: this.#instant(moment), source });
	}

	async #reportHeard(show: Show, playing: Playing[]): Promise<void> {
		const moment = (await playing[0]?.onset()) ?? null;
		if (moment === null) return this.#reportMissed(show, 'sound-off');
		this.#report(show, { shown: true, measured: this.#instant(moment), source: 'audio-clock' });
	}

	#instant(moment: number): string {
		return instantOf(this.#ports.clock.at(moment));
	}

	#drop(waiting: Waiting, reason: NotShown): void {
		if (!this.#waiting.includes(waiting)) return;
		this.#forget(waiting);
		for (const sound of waiting.playing) sound.stop();
		this.#reportMissed(waiting.show, reason);
	}

	#forget(waiting: Waiting): void {
		clearTimeout(waiting.timer);
		this.#waiting = this.#waiting.filter((one) => one !== waiting);
	}

	#clear(): void {
		for (const sound of this.#current?.playing ?? []) sound.stop();
		this.#current = null;
		this.#ports.stage.clear();
	}

	#reportMissed(show: Show, reason: NotShown): void {
		this.#report(show, { shown: false, reason });
	}

	#report(show: Show, outcome: Omit<EventData['trial-onset'], 'trial' | 'planned'>): void {
		this.#ports.report({ trial: show.trial, planned: instantOf(show.showAt), ...outcome });
	}

	#onVisibility = (): void => {
		if (document.hidden) this.giveUp('hidden');
	};
}

function median(values: readonly number[]): number | undefined {
	return values.toSorted((a, b) => a - b)[values.length >> 1];
}
