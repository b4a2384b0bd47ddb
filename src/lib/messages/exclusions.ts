import type { ExclusionReason } from '$lib/mapping/case-state';
import type { NotShown } from '$lib/stimuli/not-shown';

const NOT_SHOWN: Record<NotShown, string> = {
	late: 'it came too late',
	'too-early': 'its time is wrong',
	hidden: 'the patient view was hidden',
	'no-frame': 'the patient view did not draw in time',
	media: 'picture or sound was not ready',
	'sound-off': 'sound is still locked: touch the patient’s screen',
	'taken-off': 'taken off before its time',
	fault: 'the patient view failed'
};

/** Why a trial does not count, in the words of the clinic. */
export function exclusionWords({ why, detail }: ExclusionReason): string {
	switch (why) {
		case 'not-shown':
			return detail === null ? 'not shown' : `not shown, ${NOT_SHOWN[detail as NotShown] ?? detail}`;
		case 'excluded':
			return detail;
		case 'pause':
			return `during a pause, ${detail}`;
		case 'other-tag':
			return `the stimulation was at tag ${detail}`;
	}
}
