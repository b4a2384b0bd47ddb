import type { Effect, ErrorKind, Purpose, ResponseClass, Score, TagKind } from './vocabulary';
import type { Rule } from './verdict';

/** A task in one language (BCP 47): what a protocol requires, what a row is about. */
export interface TaskLanguage {
	task: string;
	language: string;
}

export type EffectOverrides = Partial<Record<Score, Partial<Record<ResponseClass, Effect>>>>;

/** Times of a trial in milliseconds. */
export interface Timing {
	/** how long an item stays on the screen; null: until the next one or until it is taken off */
	shown: number | null;
	/** shortest pause between two stimulations that needs no reminder */
	pause: number;
	/** how far ahead of its time a presentation is sent */
	lead: number;
}

/** What a picture, text or sound of an item is, as a case copies it. */
export type Prompt =
	| { kind: 'picture'; files: { file: string; width: number }[]; attribution?: string }
	| { kind: 'text'; text: string }
	| { kind: 'sound'; file: string; duration: number };

/** One item as a case copied it from an item set. */
export interface CaseItem {
	id: string;
	answer: string;
	accepted: string[];
	prompts: Prompt[];
	category?: string;
}

/** `data` of every released type, version 1. */
export interface EventData {
	'tag-placed': { tag: string; kind?: TagKind };
	'tag-removed': { tag: string };
	'protocol-set': {
		rule?: Rule;
		effects?: EffectOverrides;
		later?: 'excluded' | 'counted';
		required?: TaskLanguage[];
		/** the error kinds that have a key of their own */
		kinds?: ErrorKind[];
		timing?: Timing;
	};
	'stimulation-settings': {
		technique: string;
		/** hertz */
		frequency: number;
		/** milliseconds per phase */
		pulseWidth: number;
		probe: string;
		/** seconds a train lasts */
		train?: number;
		note?: string;
	};
	'run-opened': { run: string; purpose: Purpose; lead?: string };
	'run-closed': { run: string };
	'trial-presented': {
		trial: string;
		item: string | null;
		task: string;
		language: string;
		tag: string | null;
		stimulated: boolean;
		/** zero to peak, per phase */
		milliamps: number | null;
		run?: string;
		technique?: string;
		showAt?: string;
	};
	'trial-onset': {
		trial: string;
		shown: boolean;
		/** RFC 3339, the time it was to be shown */
		planned?: string;
		/** RFC 3339, the time it was shown, by `source` */
		measured?: string;
		source?: 'presentation-time' | 'paint-time' | 'animation-frame' | 'audio-clock' | 'examiner';
		/** why it was not shown */
		reason?: string;
	};
	'trial-scored': {
		trial: string;
		score: Score;
		also?: Score[];
		when?: 'during' | 'within-4s' | 'later';
		movement?: { tongue?: 'kept' | 'lost'; hand?: 'kept' | 'lost' };
		said?: string;
		note?: string;
		corrects: string[];
	};
	'trial-corrected': {
		trial: string;
		tag?: string | null;
		stimulated?: boolean;
		milliamps?: number | null;
		item?: string | null;
		task?: string;
		language?: string;
	};
	'trial-excluded': { trial: string; reason: string };
	'entry-withdrawn': { entry: string; reason?: string };
	'pause-opened': { pause: string; reason: string };
	'pause-closed': { pause: string };
	'stimulation-started': {
		stimulation: string;
		trial?: string;
		tag: string | null;
		milliamps: number | null;
		source: string;
	};
	'stimulation-ended': { stimulation: string };
	/** an item set, or a part of one, copied into the case */
	'items-copied': {
		set: string;
		version: string;
		task: string;
		language: string;
		/** said before the answer ("this is a ..."), or null */
		leadIn: string | null;
		items: CaseItem[];
	};
	/** the therapist keeps or drops an item for this patient */
	'item-decided': { item: string; task: string; language: string; keep: boolean; reason?: string };
}

export type EventType = keyof EventData;

export const EVENT_TYPES = [
	'tag-placed',
	'tag-removed',
	'protocol-set',
	'stimulation-settings',
	'run-opened',
	'run-closed',
	'trial-presented',
	'trial-onset',
	'trial-scored',
	'trial-corrected',
	'trial-excluded',
	'entry-withdrawn',
	'pause-opened',
	'pause-closed',
	'stimulation-started',
	'stimulation-ended',
	'items-copied',
	'item-decided'
] as const satisfies readonly EventType[];

/** An event as a device makes it. */
export interface CaseEvent<T extends EventType = EventType> {
	/** UUIDv7 */
	id: string;
	type: T;
	v?: 1;
	/** RFC 3339 with offset: the device's estimate of the server's time */
	at: string;
	device: string;
	/** milliseconds since the page was loaded, never set back */
	monotonic: number;
	data: EventData[T];
	/** account id of who acted; the default is who is signed in */
	by?: string;
	/** RFC 3339: the device's own clock */
	clock?: string;
	/** milliseconds of doubt in `at` */
	uncertainty?: number;
	/** UUID of the page load */
	boot?: string;
}

export type AnyCaseEvent = { [T in EventType]: CaseEvent<T> }[EventType];

/** What the server adds. An event that still waits on its device has none of it. */
export interface Receipt {
	position: number;
	receivedAt: string;
	sender: string;
	hash: string;
}

export type LogEvent = AnyCaseEvent & Partial<Receipt>;
