import type { TaskLanguage } from '$lib/mapping/events';
import type { Protocol } from '$lib/mapping/protocol';
import { effectTable, overridesOf, type EffectTable } from '$lib/mapping/protocol-change';
import type { ErrorKind } from '$lib/mapping/vocabulary';
import { PROTOCOL_PART } from '$lib/messages/case-home';

/** A protocol while somebody edits it: numbers as they are typed, times in seconds. */
export interface ProtocolDraft {
	minTrials: string;
	part: string;
	whole: string;
	kinds: ErrorKind[];
	effects: EffectTable;
	later: Protocol['later'];
	required: TaskLanguage[];
	/** empty: until it is taken off */
	shown: string;
	pause: string;
	/** milliseconds */
	lead: string;
}

export type DraftFaults = Partial<Record<'minTrials' | 'share' | 'shown' | 'pause' | 'lead', string>>;

export function draftOf(protocol: Protocol): ProtocolDraft {
	const { rule, timing } = protocol;
	return {
		minTrials: String(rule.minTrials),
		part: String(rule.share[0]),
		whole: String(rule.share[1]),
		kinds: [...protocol.kinds],
		effects: effectTable(protocol),
		later: protocol.later,
		required: protocol.required.map((pair) => ({ ...pair })),
		shown: timing.shown === null ? '' : String(timing.shown / 1000),
		pause: String(timing.pause / 1000),
		lead: String(timing.lead)
	};
}

/** The protocol a draft means, or what does not fit; the limits are those of the case log. */
export function readDraft(draft: ProtocolDraft): { protocol: Protocol } | { faults: DraftFaults } {
	const minTrials = whole(draft.minTrials, 1, 20);
	const [part, all] = [whole(draft.part, 1, 100), whole(draft.whole, 1, 100)];
	const shown = String(draft.shown).trim() === '' ? null : number(draft.shown, 0.1, 600);
	const pause = number(draft.pause, 0, 600);
	const lead = number(draft.lead, 0, 2000);

	const faults: DraftFaults = {};
	if (minTrials === undefined) faults.minTrials = PROTOCOL_PART.minTrialsWrong;
	if (part === undefined || all === undefined || part > all) faults.share = PROTOCOL_PART.shareWrong;
	if (shown === undefined) faults.shown = PROTOCOL_PART.shownWrong;
	if (pause === undefined) faults.pause = PROTOCOL_PART.pauseWrong;
	if (lead === undefined) faults.lead = PROTOCOL_PART.leadWrong;
	if (Object.keys(faults).length > 0) return { faults };
	return {
		protocol: {
			rule: { minTrials: minTrials!, share: [part!, all!] },
			effects: overridesOf(draft.effects),
			later: draft.later,
			required: draft.required,
			kinds: draft.kinds,
			timing: { shown: shown == null ? null : Math.round(shown * 1000), pause: Math.round(pause! * 1000), lead: lead! }
		}
	};
}

/** The number typed, with a point or a comma, when it lies within the limits. */
function number(text: string, from: number, to: number): number | undefined {
	const typed = String(text).trim().replace(',', '.');
	if (!/^\d+(\.\d+)?$/.test(typed)) return undefined;
	const value = Number(typed);
	return value >= from && value <= to ? value : undefined;
}

function whole(text: string, from: number, to: number): number | undefined {
	const value = number(text, from, to);
	return value !== undefined && Number.isInteger(value) ? value : undefined;
}
