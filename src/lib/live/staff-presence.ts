import type { StaffPresence } from '$lib/stimuli/presence';
import type { LiveCase } from './live-case.svelte';

const EVERY = 1000;

/**
 * Tells the server each second what this device has waiting and which run it leads, so that the surgeon screen knows
 * whether it is up to date. Returns what ends it.
 */
export function reportPresence(live: LiveCase, run: () => { run: string; lead: string | null } | null): () => void {
	const report = () => {
		const current = run();
		const presence: StaffPresence = {
			device: live.device,
			waiting: live.outbox?.waiting.length ?? 0,
			oldest: live.outbox?.oldest() ?? 0,
			leads: current && current.lead === live.device ? current.run : null
		};
		fetch(`/api/cases/${live.code}/presence`, {
			method: 'POST',
			headers: { 'content-type': 'application/json' },
			body: JSON.stringify(presence)
		}).catch(() => {
			// The server is not reached: the surgeon screen finds out by the silence.
		});
	};
	report();
	const timer = setInterval(report, EVERY);
	return () => clearInterval(timer);
}
