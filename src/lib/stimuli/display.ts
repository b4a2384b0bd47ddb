import type { Prompt } from '$lib/mapping/events';

/** What a patient view shows or plays of an item: the media alone, nothing that tells the answer's place in a case. */
export type DisplayPrompt = Prompt;

/** How an item lies on the screen for somebody who lies on the side. */
export interface Layout {
	/** quarter turns clockwise */
	turn: 0 | 1 | 2 | 3;
	mirrored: boolean;
	/** offset of the centre, as a share of half the screen, -1 to 1 */
	x: number;
	y: number;
	/** visual angle of the item's longer side, in degrees */
	degrees: number;
	/** from the eyes to the screen, in millimetres */
	distance: number;
}

export const DEFAULT_LAYOUT: Readonly<Layout> = Object.freeze({
	turn: 0,
	mirrored: false,
	x: 0,
	y: 0,
	degrees: 7,
	distance: 550
});

/** A message to the patient view; the same id twice is one message. */
export type DisplayCommand =
	| {
			id: string;
			kind: 'show';
			/** names the presentation, so that the view can say what became of it */
			trial: string;
			/** server time in milliseconds since the epoch; after it the item is not shown any more */
			showAt: number;
			/** milliseconds on the screen; null: until the next message */
			duration: number | null;
			prompts: DisplayPrompt[];
	  }
	| { id: string; kind: 'blank' }
	| { id: string; kind: 'layout'; layout: Layout }
	/** the case's items have changed: load them again */
	| { id: string; kind: 'prepare' }
	/** say hello: a full-screen number, to find the right window */
	| { id: string; kind: 'identify'; text: string };

/** What a patient view tells of itself, each second. */
export interface PatientPresence {
	visible: boolean;
	fullScreen: boolean;
	/** sound and full screen were unlocked by a touch */
	unlocked: boolean;
	wakeLock: boolean;
	/** media loaded and decoded, of how many */
	ready: number;
	total: number;
	/** milliseconds since the last animation frame */
	frameAge: number;
	/** the screen was calibrated with a card */
	calibrated: boolean;
}
