/** Words of the patient view: before the run only. While items are shown it has none. */

export const PATIENT_TITLE = 'Patient view';

export const PAIRING = {
	heading: 'Patient view',
	intro: 'Pair this screen with a case. The code stands on the examiner’s screen.',
	code: 'Code',
	codeHint: 'Eight letters and digits, good for ten minutes.',
	pair: 'Pair this screen',
	incomplete: 'A code has eight letters and digits.',
	notReached: 'The server is not reached. Check the network, then try again.',
	ended: 'The examiner has ended this patient view. Enter a new code to go on.',
	waiting: (number: string) => `The examiner sees ${number} too`,
	waitingHint: 'It goes on by itself once the examiner has confirmed this number.',
	another: 'Enter another code'
};

export const SET_UP = {
	heading: 'Set up the screen',
	steps: { sound: 'Sound', size: 'Size', place: 'Place' },
	itemsReady: (ready: number, total: number) =>
		total === 0 ? 'No pictures or sounds in this case yet' : `${ready} of ${total} pictures and sounds ready`,
	unlock: 'Sound and full screen',
	unlockHint: 'One touch. A word is played to try the loudspeaker.',
	played: 'A word was played.',
	noSounds: 'This case has nothing to listen to.',
	notPlayed: 'This browser holds the sound back. Touch again.',
	again: 'Play again',
	size: 'Picture size',
	degrees: (degrees: number) => `${degrees}°`,
	distance: 'Eyes to screen',
	millimetres: (mm: number) => `${Math.round(mm)} mm`,
	onScreen: (mm: number) => `${Math.round(mm)} mm on this screen`,
	notMeasured: 'This screen was not measured yet: the size is a guess.',
	measure: 'Measure with a card',
	measureAgain: 'Measure again',
	place: 'Drag the letter, or use the arrows. It lies as every item will.',
	turn: 'Turn',
	mirror: 'Mirror',
	left: 'Move towards the left edge',
	right: 'Move towards the right edge',
	up: 'Move up',
	down: 'Move down',
	centre: 'Centre',
	ready: 'Ready',
	readyHint: 'The screen goes plain and waits for the examiner.'
};

export const CARD = {
	heading: 'Measure this screen',
	intro: 'Lay a bank or identity card into the corner, then make the frame just as large.',
	slider: 'Width of the frame',
	smaller: 'Smaller',
	larger: 'Larger',
	done: 'It fits',
	cancel: 'Back'
};

export const TOUCH_ONCE = 'Touch the screen once';
