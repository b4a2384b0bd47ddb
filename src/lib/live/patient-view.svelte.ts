import type { EventData } from '$lib/mapping/events';
import type { DisplayCommand, Layout, PatientPresence } from '$lib/stimuli/display';
import { followStream } from './case-stream';
import { deviceName } from './device';
import { keepLayout, keptLayout } from './kept-layout';
import { makeEvent } from './make-event';
import { MediaLibrary } from './media-library.svelte';
import { Outbox } from './outbox.svelte';
import { askPairing } from './pairing.svelte';
import { patientChannel, type ChannelMessage, type PatientWord } from './patient-channel';
import { Presenter } from './presenter';
import { applyScale, keepScreen, readScreen } from './screen';
import { ScreenHold } from './screen-hold.svelte';
import { SeenMessages } from './seen-messages';
import { ServerClock } from './server-clock.svelte';
import { SoundOutput } from './sound-output';
import { sideOnScreen, Stage } from './stage';

const PRESENCE_EVERY = 1000;
const IDENTIFY_FOR = 4000;

/** Set once the set-up of this view was done in this window: a reload in mid-run goes straight back to the ground. */
const setUpKey = (view: string) => `wordkeep-set-up-${view}`;

/**
 * A paired screen for the patient, from the examiner's word to its end: takes messages from the server and from the
 * other window of its computer, shows items, and says what became of them.
 */
export class PatientView {
	readonly view: string;
	layout = $state.raw<Layout>(keptLayout());
	/** CSS pixels per millimetre */
	scale = $state(readScreen().pxPerMm);
	calibrated = $state(readScreen().calibrated);
	/** the set-up is over, or an item came before it was: nothing is on the screen but items */
	running = $state(false);
	/** sound and full screen were unlocked by a touch, or the browser needed none */
	unlocked = $state(false);
	/** a word was sent to the loudspeaker to be tried */
	tried = $state(false);
	/** a sound will need a touch first, and no item has come yet that would be disturbed by saying so */
	asksTouch = $derived.by(() => this.running && !this.unlocked && this.media.hasSounds === true && !this.#shown);
	/** what is shown to find this window among others, or null */
	called = $state<string | null>(null);
	readonly media: MediaLibrary;
	readonly screen = new ScreenHold();

	#shown = $state(false);
	#device = deviceName('patient');
	#clock = new ServerClock();
	#loadedSound: Promise<SoundOutput> | null = null;
	/** Loaded once the case turns out to have something to listen to. */
	#sound = (): Promise<SoundOutput> => {
		this.#loadedSound ??= SoundOutput.load().then((sound) => {
			sound.follow((running) => (this.unlocked = running));
			return sound;
		});
		return this.#loadedSound;
	};
	#seen = new SeenMessages();
	#presenter: Presenter | null = null;
	#stage: Stage | null = null;
	#outbox: Promise<Outbox>;
	#channel: BroadcastChannel;
	#ends: (() => void)[] = [];
	#telling = false;
	#stopped = false;
	#onEnded: () => void;

	/**
	 * @param view the id the server gave it
	 * @param onEnded called when the examiner has ended it or another screen took its place
	 */
	constructor(view: string, onEnded: () => void) {
		this.view = view;
		this.#onEnded = onEnded;
		this.running = sessionStorage.getItem(setUpKey(view)) !== null;
		this.media = new MediaLibrary(this.#sound, () => sideOnScreen(this.layout));
		this.#outbox = Outbox.open(`patient ${view}`, '/api/patient/events');
		this.#channel = patientChannel(view);
		this.#channel.onmessage = ({ data }: MessageEvent<ChannelMessage>) => {
			if (data.to === 'patient') this.#take(data.command);
		};
	}

	/** Begins to show, in `host`. */
	start(host: HTMLElement): void {
		applyScale();
		const stage = new Stage(host, this.layout);
		this.#stage = stage;
		this.#presenter = new Presenter({
			clock: this.#clock,
			media: this.media,
			sound: this.#sound,
			stage,
			report: (onset) => void this.#report(onset)
		});
		const fit = () => stage.fit();
		const fault = () => this.#presenter?.giveUp('fault');
		const beat = setInterval(() => void this.tell(), PRESENCE_EVERY);
		addEventListener('resize', fit);
		addEventListener('error', fault);
		addEventListener('unhandledrejection', fault);
		this.#ends.push(
			() => removeEventListener('resize', fit),
			() => removeEventListener('error', fault),
			() => removeEventListener('unhandledrejection', fault),
			() => clearInterval(beat),
			this.#clock.start(),
			followStream(() => '/api/patient/stream', {
				passing: { display: (command: DisplayCommand) => this.#take(command), ended: () => this.#end() }
			})
		);
		void this.media.load();
		void this.screen.keepAwake();
	}

	stop(): void {
		if (this.#stopped) return;
		for (const end of this.#ends.splice(0)) end();
		this.#presenter?.stop();
		this.media.stop();
		this.screen.stop();
		this.#stopped = true;
		this.#channel.close();
		this.#outbox.then(
			(outbox) => outbox.close(),
			() => undefined
		);
	}

	/** Call in answer to a touch: sound, full screen and wake lock. */
	async unlock(): Promise<void> {
		void this.screen.keepAwake();
		const filled = this.screen.fullScreen ? Promise.resolve() : this.screen.fill();
		// A case without sounds has nothing to unlock but the screen.
		this.unlocked = this.media.hasSounds === false || (await (await this.#sound()).unlock());
		await filled;
	}

	/**
	 * Call when it is known whether the case has sounds. Some browsers let sound through without a touch, for one after
	 * a reload.
	 */
	async unlockWithoutTouch(): Promise<void> {
		if (this.media.hasSounds === true) this.unlocked = await (await this.#sound()).unlock();
		else if (this.media.hasSounds === false && this.running) this.unlocked = true;
	}

	/** Plays a word of the case, or a tone, to try the loudspeaker. */
	async tryLoudspeaker(): Promise<void> {
		if (this.media.hasSounds === false) return;
		const sound = await this.#sound();
		const word = (await this.media.anySound()) ?? sound.tone();
		this.tried = sound.running;
		sound.play(word, performance.now());
	}

	finishSetUp(): void {
		sessionStorage.setItem(setUpKey(this.view), 'done');
		this.running = true;
	}

	setLayout(layout: Layout): void {
		this.layout = layout;
		keepLayout(layout);
		if (this.#stage) this.#stage.layout = layout;
	}

	/** @param pxPerMm CSS pixels, measured with a card */
	calibrate(pxPerMm: number): void {
		keepScreen({ pxPerMm });
		this.scale = pxPerMm;
		this.calibrated = true;
		this.#stage?.fit();
	}

	/** Says how it is with this screen: to the other window at once, and to the server. */
	async tell(): Promise<void> {
		const presence = this.#presence();
		this.#say({ kind: 'presence', ...presence });
		if (this.#telling) return;
		this.#telling = true;
		try {
			const response = await fetch('/api/patient/presence', {
				method: 'POST',
				headers: { 'content-type': 'application/json' },
				body: JSON.stringify(presence),
				signal: AbortSignal.timeout(3 * PRESENCE_EVERY)
			});
			if (response.status === 401) await this.#askWhetherEnded();
		} catch {
			// The server is not reached: the run goes on by the other window alone.
		} finally {
			this.#telling = false;
		}
	}

	#presence(): PatientPresence {
		return {
			visible: this.screen.visible,
			fullScreen: this.screen.fullScreen,
			unlocked: this.unlocked,
			wakeLock: this.screen.awake,
			ready: this.media.ready,
			total: this.media.total,
			frameAge: this.#presenter ? Math.max(0, performance.now() - this.#presenter.lastFrame) : 0,
			calibrated: this.calibrated
		};
	}

	#take(command: DisplayCommand): void {
		if (!this.#seen.isNew(command.id)) return;
		this.#say({ kind: 'received', command: command.id });
		switch (command.kind) {
			case 'show':
				this.called = null;
				this.#shown = true;
				this.finishSetUp();
				return this.#presenter?.show(command);
			case 'blank':
				return this.#presenter?.giveUp('taken-off');
			case 'layout':
				return this.setLayout(command.layout);
			case 'prepare':
				return void this.media.load();
			case 'identify':
				return this.#callOut(command.text);
		}
	}

	#callOut(text: string): void {
		this.called = text;
		setTimeout(() => (this.called = null), IDENTIFY_FOR);
	}

	async #report(onset: EventData['trial-onset']): Promise<void> {
		const { trial, shown, reason } = onset;
		this.#say({ kind: 'onset', trial, shown, ...(reason === undefined ? {} : { reason }) });
		try {
			await (await this.#outbox).add([makeEvent('trial-onset', onset, this.#device, this.#clock)]);
		} catch (failure) {
			// This device cannot save it: without an entry the examiner is asked what was shown.
			console.error(failure);
		}
	}

	#say(word: PatientWord): void {
		if (this.#stopped) return;
		this.#channel.postMessage({ to: 'staff', word } satisfies ChannelMessage);
	}

	async #askWhetherEnded(): Promise<void> {
		const pairing = await askPairing();
		if (pairing && (pairing.state !== 'confirmed' || pairing.view !== this.view)) this.#end();
	}

	#end(): void {
		this.#presenter?.giveUp('taken-off');
		this.#onEnded();
	}
}
