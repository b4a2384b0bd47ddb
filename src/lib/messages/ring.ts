import type { ResponseClass } from '$lib/mapping/vocabulary';
import type { Verdict } from '$lib/mapping/verdict';
import { CLASS_NAMES, VERDICT_NAMES } from './trade';

/** What a trial ring says to those who hear it: "tag 7, positive, 2 of 3 disturbed". */
export function ringName(ring: {
	tag: string;
	verdict: Verdict;
	/** the classes that are positive */
	positive: readonly ResponseClass[];
	disturbed: number;
	valid: number;
	excluded: number;
}): string {
	const motor = ring.positive.includes('speech-motor');
	const parts = [
		`tag ${ring.tag}`,
		motor
			? `${VERDICT_NAMES[ring.verdict]} (${ring.positive.map(className).join(' and ')})`
			: VERDICT_NAMES[ring.verdict]
	];
	if (ring.valid > 0) parts.push(`${ring.disturbed} of ${ring.valid} disturbed`);
	if (ring.excluded > 0) parts.push(`${ring.excluded} not counted`);
	return parts.join(', ');
}

function className(asked: ResponseClass): string {
	return CLASS_NAMES[asked];
}
