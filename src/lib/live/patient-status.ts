import type { PatientPresence } from '$lib/stimuli/display';
import type { Heard } from '$lib/stimuli/presence';

/** How the patient view stands, as the examiner is told. */
export type PatientStatus =
	| { is: 'not-paired' }
	| { is: 'lost' }
	| { is: 'hidden' | 'locked' | 'not-full-screen' | 'loading' | 'on-screen'; presence: PatientPresence };

/** A view not heard for so long is lost, in milliseconds. */
export const LOST_AFTER = 2000;

/**
 * The status by the freshest word there is: straight from the other window, or through the server.
 *
 * @param direct the last word of the other window and how long ago it came, in milliseconds
 * @param passed the last word the server passed on and how long ago it was heard
 */
export function patientStatus(
	paired: boolean,
	direct: { age: number; presence: PatientPresence } | null,
	passed: { age: number; heard: Heard & { kind: 'patient' } } | null
): PatientStatus {
	if (!paired) return { is: 'not-paired' };
	const words: { age: number; presence: Partial<PatientPresence> | null }[] = [];
	if (direct) words.push(direct);
	if (passed) words.push({ age: passed.age, presence: passed.heard.connected ? passed.heard : null });
	const [freshest] = words.filter(({ age }) => age < LOST_AFTER).sort((a, b) => a.age - b.age);
	if (!freshest?.presence) return { is: 'lost' };
	return stateOf(freshest.presence as PatientPresence);
}

function stateOf(presence: PatientPresence): PatientStatus {
	if (!presence.visible || presence.frameAge > LOST_AFTER) return { is: 'hidden', presence };
	if (!presence.unlocked) return { is: 'locked', presence };
	if (!presence.fullScreen) return { is: 'not-full-screen', presence };
	if (presence.ready < presence.total) return { is: 'loading', presence };
	return { is: 'on-screen', presence };
}
