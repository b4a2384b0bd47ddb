/** Why a patient view did not show something, as it stands in `trial-onset`. */
export const NOT_SHOWN = [
	/** it arrived after its time */
	'late',
	/** its time was too far ahead to be meant */
	'too-early',
	/** the page was hidden or covered */
	'hidden',
	/** the screen was not drawn in time */
	'no-frame',
	/** a picture or sound could not be loaded in time */
	'media',
	/** the browser has not let sound through */
	'sound-off',
	/** it was taken off, or another took its place, before its time */
	'taken-off',
	/** the page failed */
	'fault'
] as const;

export type NotShown = (typeof NOT_SHOWN)[number];
