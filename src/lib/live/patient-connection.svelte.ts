import type { LiveCase } from './live-case.svelte';
import { PatientLink } from './patient-link.svelte';
import { patientStatus, type PatientStatus } from './patient-status';
import { localNow } from './server-clock.svelte';
import { StaffPairing, type PairedView } from './staff-pairing.svelte';

const TICK = 200;

/**
 * The patient view as a staff page has it: which one is paired, the way to it, and how it stands. Make it while a
 * component is set up; it ends with the component.
 */
export class PatientConnection {
	readonly pairing: StaffPairing;
	/** null while no view is paired */
	link = $state.raw<PatientLink | null>(null);
	/** this page's clock, moved on a few times a second; milliseconds since the epoch */
	tick = $state(localNow());

	#live: LiveCase;

	constructor(live: LiveCase, views: { active: PairedView | null; waiting: PairedView | null }) {
		this.#live = live;
		this.pairing = new StaffPairing(live.code, views);
		$effect(() => this.#follow());
		$effect(() => {
			if (live.pairingNews > 0) void this.pairing.refresh();
		});
		$effect(() => {
			const timer = setInterval(() => (this.tick = localNow()), TICK);
			return () => clearInterval(timer);
		});
	}

	/** Server time, moved on with `tick`. */
	get now(): number {
		void this.tick;
		return this.#live.clock.now();
	}

	get status(): PatientStatus {
		const heard = this.#live.heard.get('patient');
		const { link, tick, now } = this;
		return patientStatus(
			this.pairing.active !== null,
			link?.presence ? { age: tick - link.presence.heardAt, presence: link.presence.presence } : null,
			heard?.kind === 'patient' ? { age: now - heard.heardAt, heard } : null
		);
	}

	/** Another view that is paired gets a way of its own. */
	#follow(): (() => void) | undefined {
		const view = this.pairing.active?.id;
		if (view === undefined) return undefined;
		const link = new PatientLink(this.#live.code, view);
		this.link = link;
		return () => {
			link.close();
			this.link = null;
		};
	}
}
