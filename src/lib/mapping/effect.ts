import type { EventData } from './events';
import type { Protocol } from './protocol';
import {
	EXCLUDED_KINDS,
	LANGUAGE_KINDS,
	SCORES,
	SPEECH_MOTOR_KINDS,
	type Effect,
	type ResponseClass,
	type Score
} from './vocabulary';

/** The parts of a score that decide what it does. */
export type Scored = Pick<EventData['trial-scored'], 'score' | 'also' | 'when' | 'movement'>;

export type EffectProtocol = Partial<Pick<Protocol, 'effects' | 'later'>>;

const DEFAULTS = new Map<Score, Record<ResponseClass, Effect>>(SCORES.map((kind) => [kind, defaults(kind)]));

function defaults(kind: Score): Record<ResponseClass, Effect> {
	if (isExcludedKind(kind)) return { language: 'excluded', 'speech-motor': 'excluded' };
	// A mouth that is blocked did not test language.
	if (kind === 'anarthria' || kind === 'negative-motor') return { language: 'excluded', 'speech-motor': 'disturbed' };
	if ((SPEECH_MOTOR_KINDS as readonly string[]).includes(kind)) {
		return { language: 'intact', 'speech-motor': 'disturbed' };
	}
	// Silence does not tell whether the muscles of speech could have moved.
	if (kind === 'speech-arrest' || kind === 'no-response') return { language: 'disturbed', 'speech-motor': 'excluded' };
	if ((LANGUAGE_KINDS as readonly string[]).includes(kind)) return { language: 'disturbed', 'speech-motor': 'intact' };
	return { language: 'intact', 'speech-motor': 'intact' };
}

function isExcludedKind(kind: Score): boolean {
	return (EXCLUDED_KINDS as readonly string[]).includes(kind);
}

/**
 * What one score says of its site for one class.
 *
 * With several kinds in one trial: an excluded kind wins, then disturbed, then excluded for this class, then intact.
 * An error that came more than 4 s after the stimulation excludes an otherwise disturbed trial unless the protocol
 * counts it. A lost movement of tongue or hand excludes for language and means nothing to speech-motor.
 *
 * @throws RangeError for a score that is not in the vocabulary
 */
export function effect(
	scored: Score | Scored,
	options: { protocol?: EffectProtocol; class?: ResponseClass } = {}
): Effect {
	const { protocol, class: asked = 'language' } = options;
	const trial: Scored = typeof scored === 'string' ? { score: scored } : scored;
	const kinds = trial.also ? [trial.score, ...trial.also] : [trial.score];

	let disturbed = false;
	let excludedHere = false;
	let excluded = false;
	for (const kind of kinds) {
		const found = effectOfKind(kind, asked, protocol);
		if (found === 'disturbed') disturbed = true;
		else if (found === 'excluded' && isExcludedKind(kind)) excluded = true;
		else if (found === 'excluded') excludedHere = true;
	}
	if (excluded || (asked === 'language' && movementLost(trial))) return 'excluded';
	if (disturbed) return trial.when === 'later' && protocol?.later !== 'counted' ? 'excluded' : 'disturbed';
	return excludedHere ? 'excluded' : 'intact';
}

function effectOfKind(kind: Score, asked: ResponseClass, protocol: EffectProtocol | undefined): Effect {
	const known = DEFAULTS.get(kind);
	if (!known) throw new RangeError(`unknown score: ${kind}`);
	return protocol?.effects?.[kind]?.[asked] ?? known[asked];
}

function movementLost({ movement }: Scored): boolean {
	return movement?.tongue === 'lost' || movement?.hand === 'lost';
}
