/** Keeps a screen in view: whole, awake, and known to be seen. */
export class ScreenHold {
	visible = $state(!document.hidden);
	fullScreen = $state(document.fullscreenElement !== null);
	awake = $state(false);
	#stopped = false;
	#lock: WakeLockSentinel | null = null;

	constructor() {
		document.addEventListener('visibilitychange', this.#onVisibility);
		document.addEventListener('fullscreenchange', this.#onFullScreen);
	}

	/** Asks for the whole screen; browsers grant it only in answer to a touch. */
	async fill(): Promise<void> {
		// A phone's browser may not know it: the item is shown all the same, and the examiner is told.
		await document.documentElement.requestFullscreen?.({ navigationUI: 'hide' }).catch(() => undefined);
	}

	/** Keeps the screen from going dark; the browser takes this back whenever the page is hidden. */
	async keepAwake(): Promise<void> {
		if (this.#lock || document.hidden) return;
		try {
			this.#lock = (await navigator.wakeLock?.request('screen')) ?? null;
		} catch {
			return;
		}
		this.awake = this.#lock !== null;
		this.#lock?.addEventListener('release', () => {
			this.#lock = null;
			this.awake = false;
		});
		if (this.#stopped) await this.#lock?.release();
	}

	stop(): void {
		this.#stopped = true;
		document.removeEventListener('visibilitychange', this.#onVisibility);
		document.removeEventListener('fullscreenchange', this.#onFullScreen);
		void this.#lock?.release();
	}

	#onVisibility = (): void => {
		this.visible = !document.hidden;
		if (this.visible) void this.keepAwake();
	};

	#onFullScreen = (): void => {
		this.fullScreen = document.fullscreenElement !== null;
	};
}
