import type { EffectOverrides, EventData, TaskLanguage, Timing } from './events';
import { DEFAULT_RULE, type Rule } from './verdict';
import type { ErrorKind } from './vocabulary';

/** The protocol in force: the standing `protocol-set` entries, later fields over earlier ones. */
export interface Protocol {
	rule: Rule;
	effects: EffectOverrides;
	later: 'excluded' | 'counted';
	required: TaskLanguage[];
	kinds: ErrorKind[];
	timing: Timing;
}

/**
 * What holds before a team says otherwise. Times: items of 4 s and a pause of at least 4 s are common practice
 * (naming trains of 4 s, pauses of 2 to 4 s: 80-patient asleep-awake-asleep series; clinical effect gone within 5 s).
 */
export const DEFAULT_PROTOCOL: Readonly<Protocol> = Object.freeze({
	rule: { ...DEFAULT_RULE },
	effects: {},
	later: 'excluded',
	required: [],
	kinds: [
		'speech-arrest',
		'anomia',
		'no-response',
		'semantic-paraphasia',
		'phonemic-paraphasia',
		'perseveration',
		'dysarthria',
		'delay',
		'error',
		'not-scorable',
		'item-not-known',
		'wrong-spot'
	],
	timing: { shown: 4000, pause: 4000, lead: 100 }
} satisfies Protocol);

/** A field given replaces that field whole; the others stay. */
export function amend(protocol: Readonly<Protocol>, change: EventData['protocol-set']): Protocol {
	const given = Object.fromEntries(Object.entries(change).filter(([, value]) => value !== undefined));
	return { ...protocol, ...given };
}
