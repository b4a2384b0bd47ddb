/** One exchange with the server: local times in milliseconds since the epoch, by the monotonic clock. */
export interface ClockSample {
	sent: number;
	received: number;
	/** the server's time when it answered */
	server: number;
}

/** This page's monotonic clock, in milliseconds since the epoch. */
export function localNow(): number {
	return performance.timeOrigin + performance.now();
}

/**
 * How far the server's clock is ahead, by the exchange with the shortest round trip: its error is at most half of
 * that (F. Cristian, Distributed Computing 1989;3:146).
 */
export function bestOffset(samples: readonly ClockSample[]): { offset: number; uncertainty: number } | null {
	const [best] = samples.toSorted((a, b) => a.received - a.sent - (b.received - b.sent));
	if (!best) return null;
	const trip = best.received - best.sent;
	return { offset: best.server - (best.sent + trip / 2), uncertainty: trip / 2 };
}

const SAMPLES = 8;
const REFRESH = 15_000;

/** The server's time as this page estimates it. Before the first answer it is the device's own clock. */
export class ServerClock {
	/** milliseconds of doubt; null while the server was not heard */
	uncertainty = $state<number | null>(null);
	#offset = 0;
	#timer: ReturnType<typeof setTimeout> | undefined;
	#stopped = false;

	/** Milliseconds since the epoch, server time. */
	now(): number {
		return localNow() + this.#offset;
	}

	/** Server time of a moment of this page's clock, `performance.now()`. */
	at(moment: number): number {
		return performance.timeOrigin + moment + this.#offset;
	}

	/** This page's `performance.now()` at a server time. */
	moment(serverTime: number): number {
		return serverTime - this.#offset - performance.timeOrigin;
	}

	/** Measures now and every 15 s, until the function returned is called. */
	start(): () => void {
		void this.#keepMeasuring();
		return () => {
			this.#stopped = true;
			clearTimeout(this.#timer);
		};
	}

	async #keepMeasuring(): Promise<void> {
		const best = bestOffset(await takeSamples());
		if (best) {
			this.#offset = best.offset;
			this.uncertainty = best.uncertainty;
		}
		if (!this.#stopped) this.#timer = setTimeout(() => void this.#keepMeasuring(), REFRESH);
	}
}

async function takeSamples(): Promise<ClockSample[]> {
	const samples: ClockSample[] = [];
	for (let i = 0; i < SAMPLES; i++) {
		const sent = localNow();
		try {
			const response = await fetch('/api/clock', { cache: 'no-store' });
			const received = localNow();
			const { now } = (await response.json()) as { now: number };
			samples.push({ sent, received, server: now });
		} catch {
			// The server is not reached: what was measured before goes on being used.
			return samples;
		}
	}
	return samples;
}
