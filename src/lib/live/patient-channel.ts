import type { DisplayCommand, PatientPresence } from '$lib/stimuli/display';

/** What a patient view says to the other window of its computer. */
export type PatientWord =
	/** the message was taken in */
	| { kind: 'received'; command: string }
	/** what became of a presentation, as it goes into the case log too */
	| { kind: 'onset'; trial: string; shown: boolean; reason?: string }
	| ({ kind: 'presence' } & PatientPresence);

/** What passes between the two windows of one computer, with the server or without it. */
export type ChannelMessage = { to: 'patient'; command: DisplayCommand } | { to: 'staff'; word: PatientWord };

/** The channel of one patient view; both windows know its id. */
export function patientChannel(view: string): BroadcastChannel {
	return new BroadcastChannel(`wordkeep patient view ${view}`);
}
