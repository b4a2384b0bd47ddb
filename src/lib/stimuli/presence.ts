import type { PatientPresence } from './display';

/** What a staff device tells of itself, each second. */
export interface StaffPresence {
	device: string;
	/** entries that wait to be sent */
	waiting: number;
	/** milliseconds the oldest of them has waited */
	oldest: number;
	/** the run it leads, or null */
	leads: string | null;
}

/** The last word of a device, as the server passes it on; `heardAt` in server time, milliseconds since the epoch. */
export type Heard =
	| ({ kind: 'staff'; heardAt: number; account: string } & StaffPresence)
	| ({ kind: 'patient'; heardAt: number; view: string; connected: boolean } & Partial<PatientPresence>);
