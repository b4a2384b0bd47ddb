import type { HowlerGlobal } from 'howler';

/** Something that plays, or will at its time. */
export interface Playing {
	stop(): void;
	/** The moment it came out, by `performance.now()`; null when it did not. Resolves soon after it began. */
	onset(): Promise<number | null>;
}

const UNLOCK_WAIT = 1000;
const ONSET_WAIT = 500;

/**
 * Sound through howler's Web Audio context. howler itself starts a sound at once or not at all; here it starts at a
 * given moment of the audio clock.
 */
export class SoundOutput {
	#howler: HowlerGlobal;

	private constructor(howler: HowlerGlobal) {
		this.#howler = howler;
		// A context that was put to sleep in a quiet minute would swallow the beginning of the next word.
		howler.autoSuspend = false;
		// Makes the context.
		howler.volume(1);
	}

	static async load(): Promise<SoundOutput> {
		const { Howler } = await import('howler/dist/howler.core.min.js');
		return new SoundOutput(Howler);
	}

	/** Whether the browser lets sound through. */
	get running(): boolean {
		return this.#howler.ctx.state === 'running';
	}

	/** Asks the browser to let sound through: it does after a touch, some do without. */
	async unlock(): Promise<boolean> {
		const resumed = this.#howler.ctx.resume().catch(() => undefined);
		await Promise.race([resumed, new Promise((done) => setTimeout(done, UNLOCK_WAIT))]);
		return this.running;
	}

	/** Tells of every change: a call on a phone takes the sound away, for one. */
	follow(tell: (running: boolean) => void): void {
		this.#howler.ctx.addEventListener('statechange', () => tell(this.running));
	}

	async decode(sound: ArrayBuffer): Promise<AudioBuffer> {
		return await this.#howler.ctx.decodeAudioData(sound);
	}

	/** A soft tone of 440 Hz for 0.6 s, where no word is at hand. */
	tone(): AudioBuffer {
		const { ctx } = this.#howler;
		const length = Math.round(ctx.sampleRate * 0.6);
		const buffer = ctx.createBuffer(1, length, ctx.sampleRate);
		const samples = buffer.getChannelData(0);
		for (let i = 0; i < length; i++) {
			const swell = Math.sin((Math.PI * i) / length);
			samples[i] = 0.25 * swell * Math.sin((2 * Math.PI * 440 * i) / ctx.sampleRate);
		}
		return buffer;
	}

	/**
	 * Plays a sound so that it is heard at a moment, or at once when that is past.
	 *
	 * @param moment by `performance.now()`
	 */
	play(buffer: AudioBuffer, moment: number): Playing {
		const { ctx, masterGain } = this.#howler;
		const source = ctx.createBufferSource();
		source.buffer = buffer;
		source.connect(masterGain);
		const start = Math.max(this.#contextTimeAt(moment), ctx.currentTime);
		source.start(start);
		let stopped = false;
		return {
			stop: () => {
				stopped = true;
				source.stop();
				source.disconnect();
			},
			onset: async () => {
				const end = performance.now() + (start - ctx.currentTime) * 1000 + ONSET_WAIT;
				while (performance.now() < end) {
					if (stopped) return null;
					if (ctx.currentTime > start && this.running) return this.#momentAt(start);
					await new Promise((done) => setTimeout(done, 20));
				}
				return null;
			}
		};
	}

	/** The pair of clocks, as sound leaves the device (Web Audio API, `getOutputTimestamp`). */
	#clocks(): { context: number; moment: number } {
		const { ctx } = this.#howler;
		const { contextTime = 0, performanceTime = 0 } = ctx.getOutputTimestamp?.() ?? {};
		if (performanceTime > 0) return { context: contextTime, moment: performanceTime };
		return { context: ctx.currentTime - (ctx.outputLatency ?? 0), moment: performance.now() };
	}

	#contextTimeAt(moment: number): number {
		const clocks = this.#clocks();
		return clocks.context + (moment - clocks.moment) / 1000;
	}

	#momentAt(contextTime: number): number {
		const clocks = this.#clocks();
		return clocks.moment + (contextTime - clocks.context) * 1000;
	}
}
